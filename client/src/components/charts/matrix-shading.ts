/**
 * How a matrix cell is shaded by its share of the row (0–1). Pale cells keep ink text and strong ones take inverse
 * text; the shades between, on which neither text would reach 4.5:1, are left out (tests/client/contrast.test.ts).
 */
export function matrixShade(share: number, isDiagonal: boolean): { alphaPercent: number; hue: string; text: string } {
  const isStrong = share >= STRONG_FROM;
  // The square root lets a confusion of a few per cent be seen among the zeros.
  const alpha = isStrong
    ? 0.88 + (0.12 * (share - STRONG_FROM)) / (1 - STRONG_FROM)
    : 0.05 + 0.35 * Math.sqrt(share / STRONG_FROM);
  const inverse = isDiagonal ? 'var(--on-spruce)' : 'var(--on-rust)';
  return {
    alphaPercent: Math.round(alpha * 1000) / 10,
    hue: isDiagonal ? 'var(--spruce)' : 'var(--rust)',
    text: isStrong ? inverse : 'var(--ink)',
  };
}

export const STRONG_FROM = 0.7;

/** The CSS background of a shaded cell over paper. */
export function matrixBackground(share: number, isDiagonal: boolean): string {
  const { alphaPercent, hue } = matrixShade(share, isDiagonal);
  return `color-mix(in srgb, ${hue} ${alphaPercent}%, var(--paper))`;
}
