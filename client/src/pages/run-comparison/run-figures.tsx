import type { Run } from '../../../../shared/contracts/run.ts';
import { runTitle } from '../../features/runs/recipe-text.ts';
import { formatNumber, formatPercent } from '../../lib/format.ts';

/** What two runs learned from, how they did on their held-out samples, and how much of each class they map. */
export function RunFigures({ first, second }: { first: Run; second: Run }) {
  const rows: [string, (run: Run) => string][] = [
    ['Overall accuracy of held-out pixels', describeAccuracy],
    ['Training polygons', (run) => formatNumber(run.trainingPolygons)],
    ['Training pixels', (run) => formatNumber(run.trainingPixels)],
    ['Held-out polygons', (run) => formatNumber(run.heldOutPolygons)],
  ];
  const classes = new Map([...first.classes, ...second.classes].map(({ id, name }) => [id, name]));
  const areaOf = (run: Run, classId: string) => {
    const found = run.areas?.find((area) => area.classId === classId);
    return found ? `${formatNumber(found.areaHa, found.areaHa < 100 ? 1 : 0)} ha` : 'not mapped';
  };
  return (
    <table className="w-full max-w-3xl text-sm" aria-label="Figures of the two runs">
      <thead>
        <tr className="text-xs text-ink-soft *:border-b *:border-edge *:py-1 *:text-right *:font-medium">
          <th scope="col" className="text-left!">
            Figure
          </th>
          <th scope="col">{runTitle(first)}</th>
          <th scope="col">{runTitle(second)}</th>
        </tr>
      </thead>
      <tbody>
        {rows.map(([name, say]) => (
          <Row key={name} name={name} first={say(first)} second={say(second)} />
        ))}
        {[...classes].map(([id, name]) => (
          <Row key={id} name={`${name}, by pixels`} first={areaOf(first, id)} second={areaOf(second, id)} />
        ))}
      </tbody>
    </table>
  );
}

function Row({ name, first, second }: { name: string; first: string; second: string }) {
  return (
    <tr className="*:border-b *:border-line *:py-1 *:text-right">
      <th scope="row" className="text-left! font-normal">
        {name}
      </th>
      <td>{first}</td>
      <td>{second}</td>
    </tr>
  );
}

function describeAccuracy({ overallAccuracy, overallLow, overallHigh }: Run): string {
  if (overallAccuracy === null) return 'undefined';
  const interval =
    overallLow === null || overallHigh === null
      ? 'too few polygons for an interval'
      : `${formatPercent(overallLow, 1)} to ${formatPercent(overallHigh, 1)}`;
  return `${formatPercent(overallAccuracy, 1)} (${interval})`;
}
