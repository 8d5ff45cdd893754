/** Properties that carry a drawing's look; the rest of the computed style is the page's business. */
const DRAWN = [
  'fill',
  'fill-opacity',
  'stroke',
  'stroke-width',
  'stroke-dasharray',
  'stroke-linecap',
  'stroke-linejoin',
  'stroke-opacity',
  'opacity',
  'font-size',
  'font-weight',
  'font-family',
  'text-anchor',
  'dominant-baseline',
] as const;

/**
 * A chart as the text of a free-standing SVG file: theme colours resolved, background filled, fonts named.
 *
 * @param chart an SVG element that is in the page, so that its styles can be read
 */
export function svgText(chart: SVGSVGElement): string {
  const { width, height } = chart.viewBox.baseVal;
  const copy = chart.cloneNode(true) as SVGSVGElement;
  const originals = [chart, ...chart.querySelectorAll('*')];
  [copy, ...copy.querySelectorAll('*')].forEach((element, index) => {
    const style = getComputedStyle(originals[index]!);
    for (const property of DRAWN) {
      const value = style.getPropertyValue(property);
      if (value) element.setAttribute(property, value);
    }
    for (const name of ['class', 'style', 'tabindex']) element.removeAttribute(name);
  });
  const background = document.createElementNS('http://www.w3.org/2000/svg', 'rect');
  background.setAttribute('width', '100%');
  background.setAttribute('height', '100%');
  background.setAttribute('fill', getComputedStyle(document.documentElement).backgroundColor || '#ffffff');
  copy.insertBefore(background, copy.firstChild);
  copy.setAttribute('width', String(width));
  copy.setAttribute('height', String(height));
  return `<?xml version="1.0" encoding="UTF-8"?>\n${new XMLSerializer().serializeToString(copy)}\n`;
}
