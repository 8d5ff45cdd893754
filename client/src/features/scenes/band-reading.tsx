import { BAND_ROLE_NAME } from '../../../../shared/constants/bands.ts';
import type { Scene } from '../../../../shared/contracts/scene.ts';
import { ChartTable } from '../../components/charts/chart-table.tsx';
import { formatCalendarDate } from '../../lib/format-date.ts';
import { CoarseNote } from './about-panel.tsx';

/** The band table for those who may look but not change. */
export function BandReading({ scene }: { scene: Scene }) {
  return (
    <section aria-label="Bands">
      <h2 className="text-lg font-semibold">{scene.name}</h2>
      <p className="mb-3 text-sm text-ink-soft">
        {scene.acquiredOn ? `Acquired ${formatCalendarDate(scene.acquiredOn)}. ` : ''}A value is the stored figure (DN)
        times the scale, plus the offset. The lead or a modeller changes this table.
      </p>
      <ChartTable
        label="Band table"
        data={{
          columns: [
            { name: 'No.', isNumber: true },
            { name: 'Name' },
            { name: 'Role' },
            { name: 'Centre, µm', isNumber: true, decimals: 4 },
            { name: 'Ground sample, m', isNumber: true, decimals: 1 },
            { name: 'Scale', isNumber: true, decimals: 8 },
            { name: 'Offset', isNumber: true, decimals: 3 },
            { name: 'Gives' },
          ],
          rows: scene.bands.map((band) => [
            band.number,
            band.name,
            BAND_ROLE_NAME[band.role],
            band.centreWavelengthUm,
            band.gsdMeters,
            band.scale,
            band.offset,
            band.quantity,
          ]),
        }}
      />
      <div className="mt-4">
        <CoarseNote scene={scene} />
      </div>
    </section>
  );
}
