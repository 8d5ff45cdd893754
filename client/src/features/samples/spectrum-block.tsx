import type { UseQueryResult } from '@tanstack/react-query';
import type { DrawingMeasure } from '../../../../shared/contracts/sample.ts';
import type { SpectralSeries } from '../../components/charts/spectral-series.ts';
import { SpectralProfile } from '../../components/charts/spectral-profile.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { formatPlusMinus } from '../../lib/format.ts';
import { measureSeries } from './spectrum-series.ts';

export interface SpectrumBlockProps {
  measure: UseQueryResult<DrawingMeasure>;
  name: string;
  colour: string;
  /** Drawn behind it: its class so far, and the nearest others. */
  behind?: (spectrum: DrawingMeasure['spectrum']) => readonly SpectralSeries[];
}

/** The spectrum of an outline, or why there is none to show. */
export function SpectrumBlock({ measure, name, colour, behind }: SpectrumBlockProps) {
  if (measure.isPending) return <PendingState label="Reading the pixels inside" shape="block" />;
  if (measure.isError) return <ErrorState error={measure.error} onRetry={() => void measure.refetch()} isInline />;
  const series = measureSeries(measure.data.spectrum, name, colour);
  if (series.points.length === 0) {
    return <BandMeans spectrum={measure.data.spectrum} />;
  }
  return (
    <SpectralProfile
      title="Spectrum of the pixels inside"
      isTitleHidden
      series={[...(behind?.(measure.data.spectrum) ?? []), series]}
      plotHeight={150}
    />
  );
}

/** The means in a table, for a scene whose bands have no wavelength to draw them along. */
function BandMeans({ spectrum }: { spectrum: DrawingMeasure['spectrum'] }) {
  const known = spectrum.filter((band) => band.mean !== null);
  if (known.length === 0) return null;
  return (
    <div>
      <table className="w-full">
        <caption className="pb-1 text-left font-medium">Mean of the pixels inside</caption>
        <thead>
          <tr className="text-xs text-ink-soft">
            <th scope="col" className="pb-0.5 text-left font-medium">
              Band
            </th>
            <th scope="col" className="pb-0.5 text-right font-medium">
              Mean ± 1 σ
            </th>
          </tr>
        </thead>
        <tbody>
          {known.map((band) => (
            <tr key={band.bandId}>
              <th scope="row" className="py-px text-left font-normal text-ink-soft">
                {band.number} · {band.name}
              </th>
              <td className="py-px text-right font-medium">
                {formatPlusMinus(band.mean, band.standardDeviation, band.quantity === 'reflectance' ? 3 : 1)}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      <p className="mt-1.5 text-xs text-ink-soft">
        With wavelengths in the scene’s band table this is drawn as a spectrum.
      </p>
    </div>
  );
}
