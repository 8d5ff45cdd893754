import { Link } from 'react-router-dom';
import type { Probe, Scene } from '../../../../shared/contracts/scene.ts';
import { SpectralProfile } from '../../components/charts/spectral-profile.tsx';
import type { SpectralSeries } from '../../components/charts/spectral-series.ts';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { formatCoordinates } from '../../lib/format-coordinates.ts';
import { formatNumber } from '../../lib/format.ts';
import { paths } from '../../lib/paths.ts';
import { type Place, useProbe } from '../../lib/project/probe-query.ts';
import { coarseBands } from './scene-text.ts';
import { THERMAL_CAUTION } from '../../../../shared/constants/cautions.ts';

interface PixelPanelProps {
  scene: Scene;
  place: Place | null;
}

/** Every band's value of the pixel that was pressed, stored and scaled, over its spectrum. */
export function PixelPanel({ scene, place }: PixelPanelProps) {
  const probe = useProbe(scene.projectId, scene, place);
  if (!place) {
    return (
      <p className="text-ink-soft">
        Press a pixel on the map to read every band there. By keyboard: move the crosshair with the arrow keys, then
        press Space.
      </p>
    );
  }
  if (probe.isPending) return <PendingState label="Reading the pixel" shape="block" />;
  if (probe.isError) return <ErrorState error={probe.error} onRetry={() => void probe.refetch()} isInline />;
  const { pixel, values } = probe.data;
  const series = pixelSeries(values);
  return (
    <div className="space-y-3">
      <p className="text-ink-soft">
        <span className="font-medium text-ink">{formatCoordinates(place.lat, place.lon, 5)}</span>
        {pixel && ` · column ${formatNumber(pixel.column)}, row ${formatNumber(pixel.row)} from the upper left`}
      </p>
      {!pixel && <p>This place is outside the scene. Press inside its edges.</p>}
      {pixel && (
        <>
          {series.points.length > 0 ? (
            <SpectralProfile title="Spectrum of this pixel" isTitleHidden series={[series]} />
          ) : (
            <NoProfile scene={scene} hasValues={values.some(({ value }) => value !== null)} />
          )}
          <ValueTable values={values} />
          {coarseBands(scene).some(({ role }) => role === 'thermal') && (
            <p className="text-xs text-ink-soft">{THERMAL_CAUTION}</p>
          )}
        </>
      )}
    </div>
  );
}

function NoProfile({ scene, hasValues }: { scene: Scene; hasValues: boolean }) {
  if (!hasValues) return <p>No band has data here.</p>;
  return (
    <p className="text-ink-soft">
      No band has a wavelength yet, so there is no spectrum to draw. Give them one in the{' '}
      <Link to={paths.sceneBands(scene.projectId, scene.id)} className="link">
        band table
      </Link>
      .
    </p>
  );
}

const DECIMALS = { reflectance: 4, kelvin: 1, 'digital number': 0 };

function ValueTable({ values }: { values: Probe['values'] }) {
  return (
    <table className="w-full">
      <thead>
        <tr className="text-left text-xs text-ink-soft">
          <th scope="col" className="border-b border-line pb-1 font-medium">
            Band
          </th>
          <th scope="col" className="border-b border-line pb-1 text-right font-medium">
            Value
          </th>
          <th scope="col" className="border-b border-line pb-1 text-right font-medium">
            Stored (DN)
          </th>
        </tr>
      </thead>
      <tbody>
        {values.map((band) => (
          <tr key={band.bandId}>
            <th scope="row" className="max-w-40 truncate py-0.5 pr-2 text-left font-normal" title={band.name}>
              <span className="text-ink-soft">{band.number}</span> {band.name}
            </th>
            <td className="py-0.5 text-right font-medium whitespace-nowrap">
              {band.value === null ? 'no data' : formatNumber(band.value, valueDecimals(band))}
              {band.value !== null && band.quantity === 'kelvin' && ' K'}
            </td>
            <td className="py-0.5 pl-3 text-right">
              {formatNumber(band.stored, band.stored !== null && !Number.isInteger(band.stored) ? 4 : 0)}
            </td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

function valueDecimals({ value, quantity }: Probe['values'][number]): number {
  return quantity === 'digital number' && value !== null && !Number.isInteger(value) ? 4 : DECIMALS[quantity];
}

function pixelSeries(values: Probe['values']): SpectralSeries {
  return {
    id: 'pixel',
    name: 'This pixel',
    colour: 'var(--ink)',
    isMain: true,
    points: values.flatMap(({ value, centreWavelengthUm, name, quantity }) =>
      value === null || centreWavelengthUm === null
        ? []
        : [{ wavelengthUm: centreWavelengthUm, bandName: name, mean: value, sd: null, quantity }],
    ),
  };
}
