import { Link } from 'react-router-dom';
import type { SignatureSet } from '../../../../shared/contracts/signature.ts';
import { ChartFrame } from '../../components/charts/chart-frame.tsx';
import { ClassSwatch } from '../../components/ui/class-swatch.tsx';
import { formatNumber, formatPercent } from '../../lib/format.ts';

export interface ClassStandingProps {
  set: SignatureSet;
  /** Where samples are drawn. */
  deskPath: string;
}

/** Samples, pixels, balance and spread of each class, and what is amiss. */
export function ClassStanding({ set, deskPath }: ClassStandingProps) {
  return (
    <ChartFrame
      title="Samples of each class"
      isTitleHidden
      isTable
      note={`Wanted, as a rule of thumb: 30 pixels a band and ${set.classes[0]?.samplesWanted ?? 10} samples. Spread: squares of a 6 × 6 grid over all samples that hold one.`}
      data={{
        columns: [
          { name: 'Class' },
          { name: 'Samples', isNumber: true },
          { name: 'Pixels', isNumber: true },
          { name: 'Pixels wanted', isNumber: true },
          { name: 'Share of pixels', isNumber: true, decimals: 4 },
          { name: 'Squares', isNumber: true },
          { name: 'Remarks' },
        ],
        rows: set.classes.map((one) => [
          one.name,
          one.nSamples,
          one.nPixels,
          one.pixelsWanted,
          one.share,
          one.squares,
          one.remarks.join(' '),
        ]),
      }}
    >
      <div className="overflow-x-auto">
        <table className="w-full border-separate border-spacing-0 text-sm" aria-label="Samples of each class">
          <thead>
            <tr className="text-ink-soft *:pb-1 *:pl-3 *:text-right *:font-medium">
              <th scope="col" className="pl-0! text-left!">
                Class
              </th>
              <th scope="col">Samples</th>
              <th scope="col">Pixels</th>
              <th scope="col">Wanted</th>
              <th scope="col">Share</th>
              <th scope="col">Spread</th>
              <th scope="col" className="w-[38%] text-left!">
                To think of
              </th>
            </tr>
          </thead>
          <tbody>
            {set.classes.map((one) => (
              <tr key={one.classId} className="*:border-t *:border-line *:py-1.5 *:pl-3 *:text-right">
                <th scope="row" className="pl-0! text-left! font-normal">
                  <span className="flex items-center gap-2">
                    <ClassSwatch size="sm" colour={one.colour} position={one.position} />
                    {one.name}
                  </span>
                </th>
                <td>{formatNumber(one.nSamples)}</td>
                <td>{formatNumber(one.nPixels)}</td>
                <td className="text-ink-soft">{formatNumber(one.pixelsWanted)}</td>
                <td>{formatPercent(one.share, 1)}</td>
                <td>
                  {one.squares} of {set.squares}
                </td>
                <td className="text-left!">
                  {one.remarks.length > 0 ? (
                    <>
                      {one.remarks.join(' ')}{' '}
                      {one.nSamples < one.samplesWanted && (
                        <Link to={deskPath} className="link">
                          Draw more
                        </Link>
                      )}
                    </>
                  ) : (
                    <span className="text-ink-soft">nothing amiss</span>
                  )}
                </td>
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </ChartFrame>
  );
}
