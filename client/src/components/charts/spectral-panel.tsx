import { extent, max, min } from 'd3-array';
import { type ScaleLinear, scaleLinear } from 'd3-scale';
import { area, line } from 'd3-shape';
import type { BandQuantity } from '../../../../shared/constants/bands.ts';
import { formatNumber } from '../../lib/format.ts';
import { SPECTRAL_REGIONS } from './spectral-regions.ts';
import { LINE_DASH, lineColour, type SpectralPoint, type SpectralSeries } from './spectral-series.ts';

interface SpectralPanelProps {
  series: readonly SpectralSeries[];
  quantity: BandQuantity;
  /** Plot box in the chart's units. */
  left: number;
  top: number;
  width: number;
  height: number;
  /** Ends of the wavelength axis. */
  domainUm: [number, number];
  ticksUm: number[];
  /** The value axis stands at the right of the plot (the thermal panel). */
  isAxisRight?: boolean;
}

/** One plot of a spectral profile: regions behind, ribbons, lines, markers, both axes. */
export function SpectralPanel(props: SpectralPanelProps) {
  const { series, quantity, left, top, width, height, domainUm, ticksUm, isAxisRight = false } = props;
  const x = scaleLinear(domainUm, [left, left + width]);
  const y = scaleLinear(valueDomain(series, quantity), [top + height, top]).nice(4);
  const yTicks = y.ticks(4);
  const decimals = quantity === 'reflectance' ? 2 : 0;
  return (
    <g>
      <Regions x={x} top={top} height={height} domainUm={domainUm} />
      {yTicks.map((tick) => (
        <g key={tick}>
          <path d={`M${left} ${y(tick)}H${left + width}`} stroke="var(--line)" />
          <text
            x={isAxisRight ? left + width + 5 : left - 5}
            y={y(tick) + 3.5}
            textAnchor={isAxisRight ? 'start' : 'end'}
            fill="var(--ink-soft)"
          >
            {formatNumber(tick, decimals)}
          </text>
        </g>
      ))}
      {ticksUm.map((tick) => (
        <g key={tick}>
          <path d={`M${x(tick)} ${top + height}v4`} stroke="var(--edge)" />
          <text x={x(tick)} y={top + height + 15} textAnchor="middle" fill="var(--ink-soft)">
            {formatNumber(tick, 1)}
          </text>
        </g>
      ))}
      {series.map((one) => (
        <Ribbon key={one.id} series={one} x={x} y={y} />
      ))}
      {series.map((one) => (
        <Profile key={one.id} series={one} x={x} y={y} decimals={quantity === 'reflectance' ? 3 : 1} />
      ))}
    </g>
  );
}

type Scale = ScaleLinear<number, number>;

function valueDomain(series: readonly SpectralSeries[], quantity: BandQuantity): [number, number] {
  const points = series.flatMap((one) => one.points);
  const low = min(points, (point) => point.mean - (point.sd ?? 0)) ?? 0;
  const high = max(points, (point) => point.mean + (point.sd ?? 0)) ?? 1;
  // Reflectance and DN are read against zero; a temperature is not.
  if (quantity !== 'kelvin') return [Math.min(0, low), high > low ? high : low + 1];
  const room = Math.max(1, (high - low) * 0.2);
  return [low - room, high + room];
}

/** About the width of a letter of the chart's text, in its units. */
const LETTER_WIDTH = 6.2;

function Regions({ x, top, height, domainUm }: { x: Scale; top: number; height: number; domainUm: [number, number] }) {
  return SPECTRAL_REGIONS.map((region, index) => {
    const from = x(Math.max(region.fromUm, domainUm[0]));
    const to = x(Math.min(region.toUm, domainUm[1]));
    if (to - from < 2) return null;
    return (
      <g key={region.name}>
        <rect
          x={from}
          y={top}
          width={to - from}
          height={height}
          fill="var(--sunken)"
          opacity={index % 2 === 0 ? 1 : 0.45}
        />
        <text x={from + 3} y={top - 4} fill="var(--ink-soft)">
          {to - from < LETTER_WIDTH * region.name.length ? region.shortName : region.name}
          <title>{`${region.longName}, ${region.fromUm}–${region.toUm} µm`}</title>
        </text>
      </g>
    );
  });
}

function Ribbon({ series, x, y }: { series: SpectralSeries; x: Scale; y: Scale }) {
  const shape = area<SpectralPoint>()
    .defined((point) => point.sd !== null)
    .x((point) => x(point.wavelengthUm))
    .y0((point) => y(point.mean - (point.sd ?? 0)))
    .y1((point) => y(point.mean + (point.sd ?? 0)));
  const points = series.points;
  // A single band has no ribbon to draw along: a bar of its ±1 σ stands for it.
  if (points.length === 1 && points[0]?.sd) {
    const [point] = points;
    return (
      <path
        d={`M${x(point.wavelengthUm)} ${y(point.mean - point.sd!)}V${y(point.mean + point.sd!)}`}
        stroke={series.colour}
        strokeWidth="7"
        strokeOpacity=".3"
      />
    );
  }
  return <path d={shape(points) ?? ''} fill={series.colour} fillOpacity=".26" />;
}

function Profile({ series, x, y, decimals }: { series: SpectralSeries; x: Scale; y: Scale; decimals: number }) {
  const path = line<SpectralPoint>()
    .x((point) => x(point.wavelengthUm))
    .y((point) => y(point.mean));
  return (
    <g>
      {series.points.length > 1 && (
        <path
          d={path(series.points) ?? ''}
          fill="none"
          stroke={lineColour(series)}
          strokeWidth={series.isMain ? 2.4 : 1.8}
          strokeDasharray={LINE_DASH[series.line ?? 'solid']}
          strokeLinejoin="round"
          strokeLinecap={series.line === 'dotted' ? 'round' : 'butt'}
        />
      )}
      {series.points.map((point) => (
        <circle
          key={`${point.bandName}${point.wavelengthUm}`}
          cx={x(point.wavelengthUm)}
          cy={y(point.mean)}
          r={series.isMain ? 3.4 : 2.4}
          fill={lineColour(series)}
          stroke="var(--card)"
          strokeWidth="1"
        >
          <title>
            {`${series.name}, ${point.bandName} ${formatNumber(point.wavelengthUm, 2)} µm: ${formatNumber(point.mean, decimals)}` +
              (point.sd === null ? '' : ` ± ${formatNumber(point.sd, decimals)}`)}
          </title>
        </circle>
      ))}
    </g>
  );
}

/** The ends of the wavelengths of all points, or null without any. */
export function wavelengthExtent(series: readonly SpectralSeries[]): [number, number] | null {
  const [low, high] = extent(series.flatMap((one) => one.points.map((point) => point.wavelengthUm)));
  return low === undefined || high === undefined ? null : [low, high];
}
