import type { Run } from '../../../../shared/contracts/run.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { SpectralProfile } from '../../components/charts/spectral-profile.tsx';
import { Slip } from '../../components/layout/slip.tsx';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { withPositions } from '../../lib/class-positions.ts';
import { formatCoordinates } from '../../lib/format-coordinates.ts';
import { formatNumber } from '../../lib/format.ts';
import { type Place, useProbe } from '../../lib/project/probe-query.ts';
import { PixelVotes } from './pixel-votes.tsx';
import { useRunProbe } from './probe-run.ts';
import { useRunVotes } from './run-votes.ts';

interface PixelSlipProps {
  run: Run;
  scene: Scene;
  scheme: readonly { id: string; position: number }[];
  place: Place;
  onClose: () => void;
}

const DECIMALS = { reflectance: 4, kelvin: 1, 'digital number': 0 };

/** One pixel of the map: the class it has, and the band values it was given it for. */
export function PixelSlip({ run, scene, scheme, place, onClose }: PixelSlipProps) {
  const mapped = useRunProbe(run.projectId, run.id, place);
  const probe = useProbe(run.projectId, scene, place);
  const votes = useRunVotes(run.projectId, run.id, place);
  const landClass = withPositions(run.classes, scheme).find((one) => one.code === mapped.data?.code);
  const pixel = probe.data?.pixel;
  const values = probe.data?.values ?? [];
  const series = pixelSeries(values);
  const failed = mapped.error ?? probe.error ?? votes.error;
  return (
    <Slip
      title={mapped.isPending ? 'Reading the pixel' : (landClass?.name ?? mapped.data?.name ?? 'No class here')}
      mark={landClass && <ClassSwatch colour={landClass.colour} position={landClass.position} />}
      note={
        <>
          {pixel && `Pixel ${formatNumber(pixel.column)}, ${formatNumber(pixel.row)} · `}
          {formatCoordinates(place.lat, place.lon)}
        </>
      }
      onClose={onClose}
    >
      {failed && (
        <ErrorState
          error={failed}
          isInline
          onRetry={() => void Promise.all([mapped.refetch(), probe.refetch(), votes.refetch()])}
        />
      )}
      {probe.isPending && !failed && <PendingState label="Reading the pixel" shape="block" />}
      {mapped.data && !landClass && (
        <p>
          {probe.data && !pixel
            ? 'This place is outside the scene.'
            : 'The map says nothing here: a chosen band has no data, or the place is outside the study area.'}
        </p>
      )}
      {pixel && (
        <>
          {votes.data && <PixelVotes run={run} votes={votes.data} scheme={scheme} />}
          {series.points.length > 0 ? (
            <SpectralProfile title="Spectrum of this pixel" isTitleHidden series={[series]} plotHeight={150} />
          ) : (
            <p className="text-ink-soft">
              No band of this scene has a wavelength, so there is no spectrum to draw. The band table on the Scenes page
              takes them.
            </p>
          )}
          <table className="w-full text-sm" aria-label="Band values of this pixel">
            <thead>
              <tr className="text-xs text-ink-soft *:border-t *:border-line *:pt-2 *:pb-1 *:font-medium">
                <th scope="col" className="text-left">
                  Band
                </th>
                <th scope="col" className="text-right">
                  Value
                </th>
                <th scope="col" className="text-right">
                  Stored (DN)
                </th>
              </tr>
            </thead>
            <tbody>
              {values.map((band) => {
                const isUsed = run.recipe.bandIds.includes(band.bandId);
                return (
                  <tr key={band.bandId} className="*:py-0.5">
                    <th scope="row" className="pr-2 text-left font-normal text-ink-soft">
                      {band.number} · {band.name}
                      {!isUsed && ' (not used)'}
                    </th>
                    <td className="text-right font-medium">
                      {band.value === null ? 'no data' : formatNumber(band.value, DECIMALS[band.quantity])}
                      {band.value !== null && band.quantity === 'kelvin' && ' K'}
                    </td>
                    <td className="pl-3 text-right">{formatNumber(band.stored)}</td>
                  </tr>
                );
              })}
            </tbody>
          </table>
          <p className="text-xs text-ink-soft">
            The class is given by the stored values of the bands of the recipe. One pixel may hold several covers; it
            carries one class.
          </p>
        </>
      )}
    </Slip>
  );
}

type ProbeValues = NonNullable<ReturnType<typeof useProbe>['data']>['values'];

function pixelSeries(values: ProbeValues) {
  return {
    id: 'pixel',
    name: 'This pixel',
    colour: 'var(--ink)',
    isMain: true,
    points: values.flatMap((band) =>
      band.value === null || band.centreWavelengthUm === null
        ? []
        : [
            {
              wavelengthUm: band.centreWavelengthUm,
              bandName: band.name,
              mean: band.value,
              sd: null,
              quantity: band.quantity,
            },
          ],
    ),
  };
}
