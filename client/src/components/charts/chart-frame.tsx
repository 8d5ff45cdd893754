import { Download } from 'lucide-react';
import { type ReactNode, useId, useRef, useState } from 'react';
import { createRoot } from 'react-dom/client';
import { flushSync } from 'react-dom';
import { classNames } from '../../lib/class-names.ts';
import { type CsvValue, toCsv } from '../../lib/csv.ts';
import { fileNameOf, saveFile } from '../../lib/save-file.ts';
import { Button } from '../ui/button.tsx';
import { Menu, MenuItem } from '../ui/menu.tsx';
import { Segmented } from '../ui/segmented.tsx';
import { ChartTable } from './chart-table.tsx';
import { svgText } from './svg-text.ts';

export interface ChartData {
  columns: readonly { name: string; isNumber?: boolean; decimals?: number }[];
  rows: readonly (readonly CsvValue[])[];
}

export interface ChartFrameProps {
  title: string;
  /** How to read it, under the title. */
  note?: ReactNode;
  /** The chart's figures: the table twin and the CSV. */
  data: ChartData;
  /** Name of the saved files; the title otherwise. */
  fileName?: string;
  /** A drawing to save when the chart on the page is no SVG (a matrix). */
  svg?: ReactNode;
  /** The chart is a table already: no twin to switch to. */
  isTable?: boolean;
  /** Leaves the title to the page around it (still read out). */
  isTitleHidden?: boolean;
  className?: string;
  /** Must hold one `<svg viewBox>`, unless `svg` is given. */
  children: ReactNode;
}

type View = 'chart' | 'table';

/** A chart with its title, its table twin, and its SVG and CSV. */
export function ChartFrame({
  title,
  note,
  data,
  fileName,
  svg,
  isTable = false,
  isTitleHidden = false,
  className,
  children,
}: ChartFrameProps) {
  const [view, setView] = useState<View>('chart');
  const bodyRef = useRef<HTMLDivElement>(null);
  const titleId = useId();
  const name = fileNameOf(fileName ?? title);
  const saveSvg = () => {
    const text = svg ? drawnText(svg) : chartText(bodyRef.current);
    if (text) saveFile(`${name}.svg`, text, 'image/svg+xml');
  };
  return (
    <figure aria-labelledby={titleId} className={classNames('min-w-0', className)}>
      <figcaption className="mb-2 flex items-start gap-x-3">
        <div className="min-w-0 flex-1">
          <p id={titleId} className={isTitleHidden ? 'sr-only' : 'text-lg font-semibold'}>
            {title}
          </p>
          {note && <p className="text-sm text-ink-soft">{note}</p>}
        </div>
        <div data-print="hide" className="flex shrink-0 items-center gap-1">
          {!isTable && (
            <Segmented<View>
              label={`Show ${title} as`}
              value={view}
              onChange={setView}
              options={[
                { value: 'chart', label: 'Chart' },
                { value: 'table', label: 'Table' },
              ]}
              className="text-xs!"
            />
          )}
          <Menu
            trigger={
              <Button kind="ghost" size="sm" aria-label={`Save ${title}`} className="px-1.5!">
                <Download aria-hidden />
              </Button>
            }
          >
            {(view === 'chart' || svg) && <MenuItem onSelect={saveSvg}>Save as SVG</MenuItem>}
            <MenuItem
              onSelect={() =>
                saveFile(
                  `${name}.csv`,
                  toCsv(
                    data.columns.map((column) => column.name),
                    data.rows,
                  ),
                  'text/csv',
                )
              }
            >
              Save as CSV
            </MenuItem>
          </Menu>
        </div>
      </figcaption>
      {view === 'chart' ? <div ref={bodyRef}>{children}</div> : <ChartTable label={title} data={data} />}
    </figure>
  );
}

function chartText(body: HTMLElement | null): string | null {
  const chart = body?.querySelector<SVGSVGElement>('svg[viewBox]');
  return chart ? svgText(chart) : null;
}

/** Draws out of sight, since colours can only be read from what is in the page. */
function drawnText(drawing: ReactNode): string | null {
  const stage = document.createElement('div');
  stage.style.cssText = 'position:absolute;left:-9999px;top:0';
  document.body.append(stage);
  const root = createRoot(stage);
  try {
    flushSync(() => root.render(drawing));
    return chartText(stage);
  } finally {
    root.unmount();
    stage.remove();
  }
}
