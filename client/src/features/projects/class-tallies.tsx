import type { Overview } from '../../../../shared/contracts/project.ts';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { TargetBar } from '../../components/ui/progress-bar.tsx';
import { formatNumber } from '../../lib/format.ts';

interface ClassTalliesProps {
  tallies: Overview['figures']['samplesPerClass'];
  /** Samples asked for a class; null when there is no target. */
  target: number | null;
}

/** Samples and pixels of each class, against the target or the largest class. */
export function ClassTallies({ tallies, target }: ClassTalliesProps) {
  const most = Math.max(1, ...tallies.map(({ samples }) => samples));
  return (
    <table className="w-full text-sm">
      <thead>
        <tr className="text-ink-soft [&>th]:border-b [&>th]:border-edge [&>th]:pb-1.5 [&>th]:font-medium">
          <th scope="col" className="text-left">
            Class
          </th>
          <th scope="col" className="w-24 text-right">
            Samples
          </th>
          <th scope="col" className="w-[34%] max-sm:hidden">
            <span className="sr-only">Share of the target</span>
          </th>
          <th scope="col" className="w-24 text-right">
            Pixels
          </th>
        </tr>
      </thead>
      <tbody>
        {tallies.map((tally, position) => (
          <tr key={tally.classId} className="[&>*]:border-b [&>*]:border-line [&>*]:py-2">
            <th scope="row" className="text-left font-normal">
              <ClassSwatch colour={tally.colour} position={position} className="mr-2.5" />
              {tally.name}
            </th>
            <td className="text-right whitespace-nowrap">
              {formatNumber(tally.samples)}
              {target !== null && <span className="text-ink-soft"> of {formatNumber(target)}</span>}
            </td>
            <td className="pl-6 max-sm:hidden">
              {target === null ? (
                <div aria-hidden className="h-1 rounded-full bg-line">
                  <div
                    className="h-full rounded-full bg-ink-soft"
                    style={{ width: `${(100 * tally.samples) / most}%` }}
                  />
                </div>
              ) : (
                <TargetBar done={tally.samples} target={target} />
              )}
            </td>
            <td className="text-right">{formatNumber(tally.pixels)}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
