import { BAND_QUANTITIES } from '../../../../shared/constants/bands.ts';
import type { SignatureSet } from '../../../../shared/contracts/signature.ts';
import type { SpectralPoint, SpectralSeries } from '../../components/charts/spectral-series.ts';

const LINES = ['solid', 'dashed', 'dotted'] as const;

/** The mean spectrum of each class shown; ribbons only while they are few enough to be told apart. */
export function classProfiles({ classes, features }: SignatureSet, shown: ReadonlySet<number>): SpectralSeries[] {
  const hasRibbons = shown.size <= 3;
  return classes.flatMap((one, c): SpectralSeries[] => {
    if (!shown.has(c)) return [];
    const points = features.flatMap((feature, f): SpectralPoint[] => {
      const mean = one.mean[f] ?? null;
      const quantity = BAND_QUANTITIES.find((known) => known === feature.quantity);
      if (feature.kind !== 'band' || feature.centreWavelengthUm === null || mean === null || !quantity) return [];
      return [
        {
          ...{ wavelengthUm: feature.centreWavelengthUm, bandName: feature.name, mean, quantity },
          sd: hasRibbons ? (one.standardDeviation[f] ?? null) : null,
        },
      ];
    });
    if (points.length === 0) return [];
    // Every other line broken, so that colour is not all that tells neighbours apart.
    return [{ id: one.classId, name: one.name, colour: one.colour, line: LINES[c % LINES.length] ?? 'solid', points }];
  });
}
