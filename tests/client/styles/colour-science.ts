export type Rgb = [number, number, number];
export type Lab = [number, number, number];

/** sRGB channels 0–255 of #rrggbb or #rgb. */
export function parseHex(hex: string): Rgb {
  const digits = hex.length === 4 ? [...hex.slice(1)].map((digit) => digit + digit).join('') : hex.slice(1);
  return [0, 2, 4].map((start) => parseInt(digits.slice(start, start + 2), 16)) as Rgb;
}

/** sRGB transfer curve inverted: IEC 61966-2-1. Channels 0–255 to linear 0–1. */
export function toLinear(rgb: Rgb): Rgb {
  return rgb.map((channel) => {
    const share = channel / 255;
    return share <= 0.04045 ? share / 12.92 : ((share + 0.055) / 1.055) ** 2.4;
  }) as Rgb;
}

/** Contrast ratio: WCAG 2.2, "contrast ratio" and "relative luminance". */
export function contrastRatio(first: Rgb, second: Rgb): number {
  const luminance = (rgb: Rgb) => {
    const [red, green, blue] = toLinear(rgb);
    return 0.2126 * red + 0.7152 * green + 0.0722 * blue;
  };
  const [dark, light] = [luminance(first), luminance(second)].sort((a, b) => a - b);
  return (light + 0.05) / (dark + 0.05);
}

/** CSS color-mix(in srgb, first percent%, second). */
export function mixSrgb(first: Rgb, percent: number, second: Rgb): Rgb {
  return first.map((channel, index) => channel * (percent / 100) + second[index] * (1 - percent / 100)) as Rgb;
}

/**
 * Full dichromacy on linear RGB: Machado, Oliveira and Fernandes (2009), A physiologically-based model for simulation of
 * color vision deficiency, IEEE TVCG 15(6), the matrices for severity 1.0 (from memory).
 */
export const DICHROMACY: Record<'protanopia' | 'deuteranopia' | 'tritanopia', [Rgb, Rgb, Rgb]> = {
  protanopia: [
    [0.152286, 1.052583, -0.204868],
    [0.114503, 0.786281, 0.099216],
    [-0.003882, -0.048116, 1.051998],
  ],
  deuteranopia: [
    [0.367322, 0.860646, -0.227968],
    [0.280085, 0.672501, 0.047413],
    [-0.01182, 0.04294, 0.968881],
  ],
  tritanopia: [
    [1.255528, -0.076749, -0.178779],
    [-0.078411, 0.930809, 0.147602],
    [0.004733, 0.691367, 0.3039],
  ],
};

export function applyMatrix(matrix: [Rgb, Rgb, Rgb], linear: Rgb): Rgb {
  return matrix.map((row) => {
    const value = row[0] * linear[0] + row[1] * linear[1] + row[2] * linear[2];
    return Math.min(1, Math.max(0, value));
  }) as Rgb;
}

/** CIELAB (D65) of linear sRGB: CIE 15, with the sRGB primaries. */
export function linearToLab([red, green, blue]: Rgb): Lab {
  const x = (0.4124564 * red + 0.3575761 * green + 0.1804375 * blue) / 0.95047;
  const y = 0.2126729 * red + 0.7151522 * green + 0.072175 * blue;
  const z = (0.0193339 * red + 0.119192 * green + 0.9503041 * blue) / 1.08883;
  const curve = (t: number) => (t > 216 / 24389 ? Math.cbrt(t) : (841 / 108) * t + 4 / 29);
  return [116 * curve(y) - 16, 500 * (curve(x) - curve(y)), 200 * (curve(y) - curve(z))];
}

/** CIEDE2000 colour difference as Sharma, Wu and Dalal (2005) write it out, Color Research & Application 30(1). */
export function ciede2000([l1, a1, b1]: Lab, [l2, a2, b2]: Lab): number {
  const rad = Math.PI / 180;
  const meanChroma = (Math.hypot(a1, b1) + Math.hypot(a2, b2)) / 2;
  const g = 0.5 * (1 - Math.sqrt(meanChroma ** 7 / (meanChroma ** 7 + 25 ** 7)));
  const [ap1, ap2] = [a1 * (1 + g), a2 * (1 + g)];
  const [c1, c2] = [Math.hypot(ap1, b1), Math.hypot(ap2, b2)];
  const hue = (a: number, b: number) => (a === 0 && b === 0 ? 0 : (Math.atan2(b, a) / rad + 360) % 360);
  const [h1, h2] = [hue(ap1, b1), hue(ap2, b2)];
  let dh = h2 - h1;
  if (c1 * c2 === 0) dh = 0;
  else if (dh > 180) dh -= 360;
  else if (dh < -180) dh += 360;
  const dL = l2 - l1;
  const dC = c2 - c1;
  const dH = 2 * Math.sqrt(c1 * c2) * Math.sin((dh / 2) * rad);
  const lMean = (l1 + l2) / 2;
  const cMean = (c1 + c2) / 2;
  let hMean = h1 + h2;
  if (c1 * c2 !== 0) {
    if (Math.abs(h1 - h2) <= 180) hMean /= 2;
    else hMean = hMean < 360 ? (hMean + 360) / 2 : (hMean - 360) / 2;
  }
  const t =
    1 -
    0.17 * Math.cos((hMean - 30) * rad) +
    0.24 * Math.cos(2 * hMean * rad) +
    0.32 * Math.cos((3 * hMean + 6) * rad) -
    0.2 * Math.cos((4 * hMean - 63) * rad);
  const sL = 1 + (0.015 * (lMean - 50) ** 2) / Math.sqrt(20 + (lMean - 50) ** 2);
  const sC = 1 + 0.045 * cMean;
  const sH = 1 + 0.015 * cMean * t;
  const rT =
    -2 * Math.sqrt(cMean ** 7 / (cMean ** 7 + 25 ** 7)) * Math.sin(60 * Math.exp(-(((hMean - 275) / 25) ** 2)) * rad);
  return Math.sqrt((dL / sL) ** 2 + (dC / sC) ** 2 + (dH / sH) ** 2 + rT * (dC / sC) * (dH / sH));
}
