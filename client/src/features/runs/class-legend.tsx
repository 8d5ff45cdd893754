import type { Run } from '../../../../shared/contracts/run.ts';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { withPositions } from '../../lib/class-positions.ts';
import { formatNumber, formatPercent } from '../../lib/format.ts';

interface ClassLegendProps {
  run: Pick<Run, 'classes' | 'areas'>;
  scheme: readonly { id: string; position: number }[];
  /** The class under the pointer's pixel, set apart. */
  markedClassId?: string | null;
}

/** What each colour of the map means, and how much of it there is by counting map pixels. */
export function ClassLegend({ run, scheme, markedClassId = null }: ClassLegendProps) {
  const areas = run.areas ?? [];
  const mapped = areas.filter((area) => area.classId !== null);
  const total = mapped.reduce((sum, area) => sum + area.areaHa, 0);
  const positions = new Map(withPositions(run.classes, scheme).map(({ id, position }) => [id, position]));
  return (
    <table className="w-full border-separate border-spacing-0 text-sm" aria-label="Classes of the map with their area">
      <thead>
        <tr className="text-xs text-ink-soft *:pb-1 *:font-medium">
          <th scope="col" className="text-left">
            Class
          </th>
          <th scope="col" className="text-right">
            Area, ha
          </th>
          <th scope="col" className="pl-3 text-right">
            Share
          </th>
        </tr>
      </thead>
      <tbody>
        {areas.map((area) => (
          <tr
            key={area.code}
            className={`*:border-t *:border-line *:py-1 ${area.classId !== null && area.classId === markedClassId ? 'bg-groundsel-wash' : ''}`}
          >
            <th scope="row" className="text-left font-normal">
              <span className="flex items-center gap-2 leading-tight">
                {area.classId === null ? (
                  <span className="w-4" />
                ) : (
                  <ClassSwatch colour={area.colour} position={positions.get(area.classId) ?? 0} />
                )}
                {area.name}
              </span>
            </th>
            <td className="text-right">{formatNumber(area.areaHa, area.areaHa < 100 ? 1 : 0)}</td>
            <td className="pl-3 text-right">
              {area.classId === null || total === 0 ? (
                <span className="text-ink-soft">–</span>
              ) : (
                formatPercent(area.areaHa / total, 1)
              )}
            </td>
          </tr>
        ))}
      </tbody>
      <tfoot>
        <tr className="*:border-t *:border-edge *:py-1 *:font-medium">
          <th scope="row" className="text-left">
            Mapped
          </th>
          <td className="text-right">{formatNumber(total)}</td>
          <td />
        </tr>
      </tfoot>
    </table>
  );
}
