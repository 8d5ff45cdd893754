import type { BandQuantity } from '../../../../shared/constants/bands.ts';
import type { ChartData } from './chart-frame.tsx';

export interface SpectralPoint {
  /** Centre wavelength of the band. */
  wavelengthUm: number;
  bandName: string;
  mean: number;
  /** One standard deviation; null draws no ribbon there. */
  sd: number | null;
  quantity: BandQuantity;
}

export interface SpectralSeries {
  id: string;
  /** "This sample", "Saltmarsh so far". */
  name: string;
  /** A class colour or a token: `var(--ink)`. */
  colour: string;
  line?: 'solid' | 'dashed' | 'dotted';
  /** Heavier line with markers, for the one the page is about. */
  isMain?: boolean;
  points: readonly SpectralPoint[];
}

export const LINE_DASH = { solid: undefined, dashed: '6 3.5', dotted: '1.500 3.500' } as const;

/** Share of a class's own colour in its line; the rest is ink, so that pale classes reach 3:1 on paper. */
export const LINE_COLOUR_PERCENT = 50;

/** The colour of a series' line: a token as it is, a class colour strengthened with ink. */
export function lineColour({ colour }: Pick<SpectralSeries, 'colour'>): string {
  return colour.startsWith('#') ? `color-mix(in srgb, ${colour} ${LINE_COLOUR_PERCENT}%, var(--ink))` : colour;
}

/** What an axis of a quantity is called. */
export const QUANTITY_AXIS: Record<BandQuantity, string> = {
  reflectance: 'reflectance',
  kelvin: 'brightness temperature, K',
  'digital number': 'digital number',
};

/** The series' figures, one row a band and series. */
export function spectralData(series: readonly SpectralSeries[]): ChartData {
  return {
    columns: [
      { name: 'Series' },
      { name: 'Band' },
      { name: 'Wavelength, µm', isNumber: true, decimals: 2 },
      { name: 'Mean', isNumber: true, decimals: 4 },
      { name: '1 σ', isNumber: true, decimals: 4 },
      { name: 'Quantity' },
    ],
    rows: series.flatMap((one) =>
      one.points.map((point) => [one.name, point.bandName, point.wavelengthUm, point.mean, point.sd, point.quantity]),
    ),
  };
}
