import type { RunComparison, RunMcNemar } from '../../../../shared/contracts/run-comparison.ts';
import { formatNumber } from '../../lib/format.ts';

/** Whether the two maps differ on the samples neither has learned from, by polygon first. */
export function SameSamplesTest({ comparison }: { comparison: RunComparison }) {
  const { heldOut, first, second } = comparison;
  if (!heldOut) {
    return <p>The runs share no held-out sample, so they cannot be tested on the same ones.</p>;
  }
  return (
    <div className="space-y-3">
      <p className="max-w-3xl">{sayVerdict(heldOut.byPolygon, first.number, second.number)}</p>
      <table className="w-full max-w-3xl text-sm" aria-label="McNemar’s test on the samples both held out">
        <thead>
          <tr className="text-xs text-ink-soft *:border-b *:border-edge *:px-2 *:py-1 *:text-right *:font-medium">
            <th scope="col" className="text-left!">
              Unit
            </th>
            <th scope="col">Right on both</th>
            <th scope="col">{`Only run ${first.number}`}</th>
            <th scope="col">{`Only run ${second.number}`}</th>
            <th scope="col">Wrong on both</th>
            <th scope="col">χ²</th>
            <th scope="col">p</th>
          </tr>
        </thead>
        <tbody>
          <Row name="Polygon" test={heldOut.byPolygon} />
          <Row name="Pixel" test={heldOut.byPixel} />
        </tbody>
      </table>
      <p className="max-w-3xl text-xs text-ink-soft">
        McNemar 1947. A polygon is right where more than half of its pixels are. p is exact under 25 units on which the
        maps differ, and from χ² above.
      </p>
    </div>
  );
}

function Row({ name, test }: { name: string; test: RunMcNemar }) {
  return (
    <tr className="*:border-b *:border-line *:px-2 *:py-1 *:text-right">
      <th scope="row" className="text-left! font-medium">
        {name} ({formatNumber(test.n)})
      </th>
      <td>{formatNumber(test.bothRight)}</td>
      <td>{formatNumber(test.onlyFirstRight)}</td>
      <td>{formatNumber(test.onlySecondRight)}</td>
      <td>{formatNumber(test.bothWrong)}</td>
      <td>{test.chiSquare === null ? '–' : formatNumber(test.chiSquare, 2)}</td>
      <td>{test.pValue === null ? '–' : formatP(test.pValue)}</td>
    </tr>
  );
}

function formatP(p: number): string {
  return p < 0.001 ? '< 0.001' : formatNumber(p, 3);
}

function sayVerdict(test: RunMcNemar, first: number, second: number): string {
  if (test.pValue === null) return 'By polygon, the two maps are right at the same held-out samples.';
  if (test.pValue >= 0.05) {
    return `By polygon, the held-out samples do not tell the two maps apart (p ${formatP(test.pValue)}).`;
  }
  const better = test.onlyFirstRight > test.onlySecondRight ? first : second;
  return `By polygon, run ${better} is right more often on the held-out samples than chance would have it (p ${formatP(test.pValue)}).`;
}
