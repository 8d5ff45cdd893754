import type { Scene } from '../../../../shared/contracts/scene.ts';
import { SpectralProfile } from '../../components/charts/spectral-profile.tsx';
import { Slip } from '../../components/layout/slip.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { formatCoordinates } from '../../lib/format-coordinates.ts';
import { formatNumber } from '../../lib/format.ts';
import { type Place, useProbe } from '../../lib/project/probe-query.ts';
import { probeSeries } from './spectrum-series.ts';

export interface ProbeSlipProps {
  projectId: string;
  scene: Scene;
  place: Place;
  onClose: () => void;
}

/** One scene pixel: every band's value, stored and scaled. */
export function ProbeSlip({ projectId, scene, place, onClose }: ProbeSlipProps) {
  const probe = useProbe(projectId, scene, place);
  const pixel = probe.data?.pixel;
  return (
    <Slip
      title={pixel ? `Pixel ${formatNumber(pixel.column)}, ${formatNumber(pixel.row)}` : 'Pixel'}
      note={`${formatCoordinates(place.lat, place.lon)} · column, row from the upper left of ${scene.name}`}
      onClose={onClose}
    >
      {probe.isPending && <PendingState label="Reading the pixel" shape="block" />}
      {probe.isError && <ErrorState error={probe.error} onRetry={() => void probe.refetch()} isInline />}
      {probe.data && !pixel && <p>This place is outside the scene. Press inside its edges.</p>}
      {probe.data && pixel && (
        <>
          <SpectralProfile title="Spectrum of this pixel" isTitleHidden series={[probeSeries(probe.data.values)]} />
          <table className="w-full border-t border-line">
            <thead>
              <tr className="text-left text-xs text-ink-soft">
                <th scope="col" className="pt-2 pb-1 font-medium">
                  Band
                </th>
                <th scope="col" className="pt-2 pb-1 text-right font-medium">
                  Value
                </th>
                <th scope="col" className="pt-2 pb-1 text-right font-medium">
                  Stored (DN)
                </th>
              </tr>
            </thead>
            <tbody>
              {probe.data.values.map((band) => (
                <tr key={band.bandId}>
                  <th scope="row" className="py-0.5 pr-2 text-left font-normal text-ink-soft">
                    {band.number} · {band.name}
                  </th>
                  <td className="py-0.5 text-right font-medium">
                    {band.value === null ? 'no data' : formatNumber(band.value, DECIMALS[band.quantity])}
                    {band.value !== null && band.quantity === 'kelvin' && ' K'}
                  </td>
                  <td className="py-0.5 text-right">{formatNumber(band.stored)}</td>
                </tr>
              ))}
            </tbody>
          </table>
        </>
      )}
    </Slip>
  );
}

const DECIMALS = { reflectance: 4, kelvin: 1, 'digital number': 0 };
