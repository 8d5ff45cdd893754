import { BAND_QUANTITIES, type BandQuantity } from '../../../../shared/constants/bands.ts';
import type { LandClass } from '../../../../shared/contracts/land-class.ts';
import type { Probe } from '../../../../shared/contracts/scene.ts';
import type { DrawingMeasure } from '../../../../shared/contracts/sample.ts';
import type { DrawingJudgement } from '../../../../shared/contracts/signature.ts';
import type { SpectralPoint, SpectralSeries } from '../../components/charts/spectral-series.ts';

type MeasuredBand = DrawingMeasure['spectrum'][number];

/** The spectrum of an outline: means with one standard deviation, bands without a wavelength left out. */
export function measureSeries(spectrum: readonly MeasuredBand[], name: string, colour: string): SpectralSeries {
  const points = spectrum.flatMap((band): SpectralPoint[] => {
    if (band.centreWavelengthUm === null || band.mean === null) return [];
    return [
      {
        wavelengthUm: band.centreWavelengthUm,
        bandName: band.name,
        mean: band.mean,
        sd: band.standardDeviation,
        quantity: asQuantity(band.quantity),
      },
    ];
  });
  return { id: 'outline', name, colour, isMain: true, points };
}

/** The class of an outline and its nearest rivals, to be drawn behind the outline's own spectrum. */
export function rivalSeries(
  rivals: DrawingJudgement['rivals'],
  spectrum: readonly MeasuredBand[],
  classes: readonly LandClass[],
): SpectralSeries[] {
  return rivals.flatMap((rival): SpectralSeries[] => {
    const landClass = classes.find(({ id }) => id === rival.classId);
    if (!landClass) return [];
    const points = spectrum.flatMap((band, place): SpectralPoint[] => {
      const mean = rival.mean[place] ?? null;
      if (band.centreWavelengthUm === null || mean === null) return [];
      return [
        {
          ...{ wavelengthUm: band.centreWavelengthUm, bandName: band.name, mean },
          sd: rival.isOwn ? (rival.standardDeviation[place] ?? null) : null,
          quantity: asQuantity(band.quantity),
        },
      ];
    });
    const name = rival.isOwn ? `${landClass.name} so far` : landClass.name;
    return [{ id: rival.classId, name, colour: landClass.colour, line: rival.isOwn ? 'dashed' : 'dotted', points }];
  });
}

/** The spectrum of one pixel. */
export function probeSeries(values: Probe['values']): SpectralSeries {
  const points = values.flatMap((band): SpectralPoint[] => {
    if (band.centreWavelengthUm === null || band.value === null) return [];
    return [
      {
        wavelengthUm: band.centreWavelengthUm,
        bandName: band.name,
        mean: band.value,
        sd: null,
        quantity: band.quantity,
      },
    ];
  });
  return { id: 'pixel', name: 'This pixel', colour: 'var(--ink)', isMain: true, points };
}

function asQuantity(text: string): BandQuantity {
  return BAND_QUANTITIES.find((quantity) => quantity === text) ?? 'digital number';
}
