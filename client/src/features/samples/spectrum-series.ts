import { BAND_QUANTITIES, type BandQuantity } from '../../../../shared/constants/bands.ts';
import type { Probe } from '../../../../shared/contracts/scene.ts';
import type { DrawingMeasure } from '../../../../shared/contracts/sample.ts';
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
