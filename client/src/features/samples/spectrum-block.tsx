import type { UseQueryResult } from '@tanstack/react-query';
import type { DrawingMeasure } from '../../../../shared/contracts/sample.ts';
import { SpectralProfile } from '../../components/charts/spectral-profile.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { measureSeries } from './spectrum-series.ts';

export interface SpectrumBlockProps {
  measure: UseQueryResult<DrawingMeasure>;
  name: string;
  colour: string;
}

/** The spectrum of an outline, or why there is none to show. */
export function SpectrumBlock({ measure, name, colour }: SpectrumBlockProps) {
  if (measure.isPending) return <PendingState label="Reading the pixels inside" shape="block" />;
  if (measure.isError) return <ErrorState error={measure.error} onRetry={() => void measure.refetch()} isInline />;
  const series = measureSeries(measure.data.spectrum, name, colour);
  if (series.points.length === 0) {
    const hasBands = measure.data.spectrum.some((band) => band.mean !== null);
    if (!hasBands) return null;
    return (
      <p className="text-ink-soft">
        No band of this scene has a wavelength, so there is no spectrum to draw. The band table on the Scenes page takes
        them.
      </p>
    );
  }
  return <SpectralProfile title="Spectrum of the pixels inside" isTitleHidden series={[series]} plotHeight={150} />;
}
