import { ticks } from 'd3-array';
import type { ReactNode } from 'react';
import { useWidth } from '../../lib/use-width.ts';
import { ChartFrame } from './chart-frame.tsx';
import { SpectralPanel, wavelengthExtent } from './spectral-panel.tsx';
import { THERMAL_FROM_UM } from './spectral-regions.ts';
import { LINE_DASH, QUANTITY_AXIS, type SpectralSeries, lineColour, spectralData } from './spectral-series.ts';

export interface SpectralProfileProps {
  title?: string;
  note?: ReactNode;
  series: readonly SpectralSeries[];
  /** Height of the plot in CSS pixels. */
  plotHeight?: number;
  isTitleHidden?: boolean;
}

const THERMAL_WIDTH = 52;
const MARGIN = { top: 18, left: 36, right: 8, foot: 36 };

/** Mean ± 1 σ by wavelength on a true axis, several series at once; thermal bands on a panel with their own axis. */
export function SpectralProfile({
  title = 'Spectral profile',
  note,
  series,
  plotHeight = 160,
  isTitleHidden = false,
}: SpectralProfileProps) {
  const [ref, width] = useWidth<HTMLDivElement>(324);
  const optical = pick(series, (um) => um < THERMAL_FROM_UM);
  const thermal = pick(series, (um) => um >= THERMAL_FROM_UM);
  const opticalExtent = wavelengthExtent(optical);
  const thermalExtent = wavelengthExtent(thermal);
  const thermalRoom = thermalExtent ? THERMAL_WIDTH + 46 : 0;
  const opticalWidth = Math.max(60, width - MARGIN.left - MARGIN.right - thermalRoom);
  const height = MARGIN.top + plotHeight + MARGIN.foot;
  const opticalQuantity = optical[0]?.points[0]?.quantity ?? 'reflectance';
  const thermalQuantity = thermal[0]?.points[0]?.quantity ?? 'kelvin';
  const domainUm: [number, number] = opticalExtent
    ? [Math.min(0.4, opticalExtent[0] - 0.05), Math.max(1, opticalExtent[1] + 0.1)]
    : [0.4, 2.5];
  const thermalDomain: [number, number] = thermalExtent
    ? [Math.floor(thermalExtent[0]) - 1, Math.ceil(thermalExtent[1]) + 1]
    : [10, 12];
  const thermalLeft = opticalExtent ? MARGIN.left + opticalWidth + 18 : MARGIN.left;
  return (
    <ChartFrame title={title} note={note} data={spectralData(series)} isTitleHidden={isTitleHidden}>
      <div ref={ref}>
        <svg
          role="img"
          aria-label={describe(series)}
          viewBox={`0 0 ${width} ${height}`}
          width={width}
          height={height}
          className="block max-w-full"
          fontSize="10.5"
          fontFamily="'Work Sans', sans-serif"
        >
          {opticalExtent && (
            <SpectralPanel
              series={optical}
              quantity={opticalQuantity}
              left={MARGIN.left}
              top={MARGIN.top}
              width={opticalWidth}
              height={plotHeight}
              domainUm={domainUm}
              ticksUm={ticks(domainUm[0], domainUm[1], opticalWidth > 360 ? 8 : 4)}
            />
          )}
          {thermalExtent && (
            <SpectralPanel
              series={thermal}
              quantity={thermalQuantity}
              left={thermalLeft}
              top={MARGIN.top}
              width={THERMAL_WIDTH}
              height={plotHeight}
              domainUm={thermalDomain}
              ticksUm={thermal[0]!.points.map((point) => point.wavelengthUm)}
              isAxisRight
            />
          )}
          <text x={MARGIN.left} y={height - 6} fill="var(--ink-soft)">
            {QUANTITY_AXIS[opticalQuantity]} by wavelength, µm
          </text>
          {thermalExtent && (
            <text x={width - 4} y={height - 6} textAnchor="end" fill="var(--ink-soft)">
              {thermalQuantity === 'kelvin' ? 'K' : thermalQuantity}
            </text>
          )}
        </svg>
        <Legend series={series} />
      </div>
    </ChartFrame>
  );
}

function pick(series: readonly SpectralSeries[], isWanted: (um: number) => boolean): SpectralSeries[] {
  return series
    .map((one) => ({
      ...one,
      points: one.points
        .filter((point) => isWanted(point.wavelengthUm))
        .sort((first, second) => first.wavelengthUm - second.wavelengthUm),
    }))
    .filter((one) => one.points.length > 0);
}

function describe(series: readonly SpectralSeries[]): string {
  if (series.length === 0) return 'Spectral profile without any series.';
  return `Spectral profile of ${series.map((one) => one.name).join(', ')}. The table has the figures.`;
}

function Legend({ series }: { series: readonly SpectralSeries[] }) {
  return (
    <ul className="mt-1 flex flex-wrap gap-x-4 gap-y-0.5 text-xs text-ink-soft">
      {series.map((one) => (
        <li key={one.id} className="flex items-center gap-1.5">
          <svg aria-hidden width="22" height="8">
            <path
              d="M1 4h20"
              stroke={lineColour(one)}
              strokeWidth={one.isMain ? 2.4 : 1.8}
              strokeDasharray={LINE_DASH[one.line ?? 'solid']}
              strokeLinecap={one.line === 'dotted' ? 'round' : 'butt'}
            />
          </svg>
          {one.name}
          {one.points.some((point) => point.sd !== null) && ' ± 1 σ'}
        </li>
      ))}
    </ul>
  );
}
