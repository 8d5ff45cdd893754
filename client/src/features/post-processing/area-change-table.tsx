import type { PostProcessingPreview } from '../../../../shared/contracts/post-processing.ts';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { formatNumber } from '../../lib/format.ts';

/** Area of each class on the classifier's map and after the steps. */
export function AreaChangeTable({ areas }: { areas: PostProcessingPreview['areas'] }) {
  return (
    <table className="w-full border-separate border-spacing-0 text-sm" aria-label="Area of each class before and after">
      <thead>
        <tr className="text-xs text-ink-soft *:pb-1 *:font-medium">
          <th scope="col" className="text-left">
            Class
          </th>
          <th scope="col" className="text-right">
            Before, ha
          </th>
          <th scope="col" className="pl-2 text-right">
            Change, ha
          </th>
        </tr>
      </thead>
      <tbody>
        {areas.map(({ code, name, colour, beforeHa, afterHa }, position) => (
          <tr key={code} className="*:border-t *:border-line *:py-1">
            <th scope="row" className="text-left font-normal">
              <span className="flex items-center gap-2 leading-tight">
                {code > 0 && code < 255 ? (
                  <ClassSwatch colour={colour} position={position} />
                ) : (
                  <span className="w-4" />
                )}
                {name}
              </span>
            </th>
            <td className="text-right">{formatNumber(beforeHa, beforeHa < 100 ? 1 : 0)}</td>
            <td className="pl-2 text-right">{sayChange(afterHa - beforeHa)}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

function sayChange(changeHa: number): string {
  if (Math.abs(changeHa) < 0.005) return '0';
  const text = formatNumber(Math.abs(changeHa), Math.abs(changeHa) < 100 ? 2 : 0);
  return changeHa > 0 ? `+${text}` : `−${text}`;
}
