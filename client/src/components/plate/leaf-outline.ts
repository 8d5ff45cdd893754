/**
 * The outline of a lobed groundsel leaf from its stalk at 0,0 to its tip at `length`,0, as an SVG path.
 *
 * @param nLobes lobes on each side
 */
export function leafOutline(length: number, nLobes: number): string {
  const side = (sign: 1 | -1) => {
    const points: { valley: [number, number]; peak: [number, number] }[] = [];
    for (let lobe = 0; lobe < nLobes; lobe++) {
      const start = lobe / nLobes;
      // Narrow at the stalk, widest past the middle, running out to the tip.
      const fullness = Math.sin(Math.PI * (0.1 + 0.86 * (start + 0.5 / nLobes)) ** 1.25);
      points.push({
        valley: [length * (0.08 + 0.86 * start), sign * length * 0.045 * fullness],
        peak: [length * (0.08 + 0.86 * (start + 0.85 / nLobes)), sign * length * 0.19 * fullness],
      });
    }
    return points;
  };
  const say = ([x, y]: [number, number]) => `${x.toFixed(1)} ${y.toFixed(1)}`;
  const upper = side(-1);
  const lower = side(1).reverse();
  const out = upper.map(
    ({ valley, peak }) => `L${say(valley)}Q${say([(valley[0] * 2 + peak[0]) / 3, peak[1]])} ${say(peak)}`,
  );
  const back = lower.map(
    ({ valley, peak }) => `L${say(peak)}Q${say([(valley[0] * 2 + peak[0]) / 3, peak[1]])} ${say(valley)}`,
  );
  return `M0 0${out.join('')}L${say([length, 0])}${back.join('')}Z`;
}
