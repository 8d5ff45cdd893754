import { Download, Printer } from 'lucide-react';
import { useParams } from 'react-router-dom';
import { PageHeader } from '../../components/layout/page-header.tsx';
import { ReadingPage } from '../../components/layout/reading-page.tsx';
import { Button, buttonClass } from '../../components/ui/button.tsx';
import { ErrorState } from '../../components/ui/error-state.tsx';
import { PendingState } from '../../components/ui/pending-state.tsx';
import { designTitle } from '../../features/designs/design-state.tsx';
import { useAnswerSheet } from '../../features/designs/get-answer-sheet.ts';
import { useDesign } from '../../features/designs/get-design.ts';
import { apiUrl } from '../../lib/fetch-json.ts';
import { formatLatitude, formatLongitude } from '../../lib/format-coordinates.ts';
import { formatNumber } from '../../lib/format.ts';
import { useProject } from '../../lib/project/project-context.ts';

/** The points of a design on paper, with room for what is found on the ground. */
export function AnswerSheetPage() {
  const { designId = '' } = useParams();
  const { id, name } = useProject();
  const design = useDesign(id, designId);
  const sheet = useAnswerSheet(id, designId);
  const failed = [design, sheet].find((one) => one.isError && !one.data);
  const actions = (
    <>
      <a href={apiUrl(`/designs/${designId}/points.csv`)} download className={buttonClass('secondary')}>
        <Download aria-hidden />
        CSV
      </a>
      <Button kind="primary" icon={<Printer aria-hidden />} onClick={() => window.print()}>
        Print
      </Button>
    </>
  );
  return (
    <ReadingPage header={<PageHeader title="Answer sheet" action={actions} />}>
      {failed && <ErrorState error={failed.error} onRetry={() => void failed.refetch()} />}
      {!failed && (!design.data || !sheet.data) && <PendingState label="Loading the points" shape="table" rows={8} />}
      {design.data && sheet.data && (
        <>
          <h2 className="text-xl font-semibold">
            {designTitle(design.data)}, {name}
          </h2>
          <p className="mt-1 mb-3 text-sm text-ink-soft">
            Latitude and longitude on WGS 84; easting and northing in {sheet.data.crsName}. Judge the pixel around the
            point, not the spot alone. Name: ____________________ Date: ______________
          </p>
          <p className="mb-4 text-sm">
            {design.data.classes.map(({ code, name: className }) => `${code} ${className}`).join(' · ')}
          </p>
          <table className="w-full border-collapse text-sm" aria-label="Points of the design">
            <thead>
              <tr className="*:border *:border-edge *:px-2 *:py-1 *:text-left *:font-medium">
                <th scope="col">Point</th>
                <th scope="col">Latitude</th>
                <th scope="col">Longitude</th>
                <th scope="col">Easting</th>
                <th scope="col">Northing</th>
                <th scope="col" className="w-[9%]">
                  Class
                </th>
                <th scope="col" className="w-[9%]">
                  Second
                </th>
                <th scope="col" className="w-[9%]">
                  Sure?
                </th>
                <th scope="col" className="w-[24%]">
                  Note
                </th>
              </tr>
            </thead>
            <tbody>
              {sheet.data.points.map(({ number, position: [lon, lat], projected: [x, y] }) => (
                <tr key={number} className="break-inside-avoid *:h-8 *:border *:border-edge *:px-2">
                  <th scope="row" className="text-left font-medium">
                    {number}
                  </th>
                  <td>{formatLatitude(lat, 5)}</td>
                  <td>{formatLongitude(lon, 5)}</td>
                  <td>{formatNumber(x)}</td>
                  <td>{formatNumber(y)}</td>
                  <td />
                  <td />
                  <td />
                  <td />
                </tr>
              ))}
            </tbody>
          </table>
        </>
      )}
    </ReadingPage>
  );
}
