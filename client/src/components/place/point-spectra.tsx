import { useQueries } from '@tanstack/react-query';
import type { Polygon } from '../../../../shared/contracts/geometry.ts';
import { BAND_QUANTITIES } from '../../../../shared/constants/bands.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { SpectralProfile } from '../charts/spectral-profile.tsx';
import type { SpectralSeries } from '../charts/spectral-series.ts';
import { ErrorState } from '../ui/error-state.tsx';
import { PendingState } from '../ui/pending-state.tsx';
import { placeMeasureQuery } from './place-measure.ts';

export interface PointSpectraProps {
  projectId: string;
  scenes: readonly Scene[];
  /** The pixel, and the 3 × 3 around it. */
  outline: Polygon;
  outline3: Polygon;
}

const LINES = ['solid', 'dashed', 'dotted'] as const;
const COLOURS = ['var(--ink)', 'var(--spruce)', 'var(--rust)'] as const;

/** The pixel's spectrum in each scene, and the mean of the nine pixels about it with its spread. */
export function PointSpectra({ projectId, outline, outline3, ...props }: PointSpectraProps) {
  // In the order of the pictures.
  const scenes = props.scenes.toSorted((a, b) => (a.acquiredOn ?? '').localeCompare(b.acquiredOn ?? ''));
  const measured = useQueries({
    queries: scenes.flatMap((scene) =>
      [outline, outline3].map((geometry) => placeMeasureQuery(projectId, scene, geometry)),
    ),
  });
  if (measured.some(({ isPending }) => isPending)) return <PendingState label="Reading the pixel" shape="block" />;
  const failed = measured.find(({ isError }) => isError);
  if (failed) return <ErrorState error={failed.error} onRetry={() => void failed.refetch()} isInline />;
  const series = scenes.flatMap((scene, s): SpectralSeries[] =>
    [measured[2 * s], measured[2 * s + 1]].flatMap((answer, around): SpectralSeries[] => {
      const points = (answer?.data?.spectrum ?? []).flatMap((band) => {
        const quantity = BAND_QUANTITIES.find((known) => known === band.quantity);
        if (band.centreWavelengthUm === null || band.mean === null || !quantity) return [];
        return [
          {
            ...{ wavelengthUm: band.centreWavelengthUm, bandName: band.name, mean: band.mean, quantity },
            sd: around === 1 ? band.standardDeviation : null,
          },
        ];
      });
      if (points.length === 0) return [];
      return [
        {
          id: `${scene.id} ${around}`,
          name: around === 1 ? `3 × 3, ${scene.name}` : `Pixel, ${scene.name}`,
          colour: COLOURS[s % COLOURS.length] ?? 'var(--ink)',
          line: around === 1 ? (LINES[1] ?? 'dashed') : LINES[0],
          isMain: around === 0,
          points,
        },
      ];
    }),
  );
  if (series.length === 0) {
    return <p className="text-sm text-ink-soft">No wavelengths in the band tables, so there is no spectrum to draw.</p>;
  }
  return <SpectralProfile title="Spectrum of the point" isTitleHidden series={series} plotHeight={120} />;
}
