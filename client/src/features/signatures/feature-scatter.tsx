import { extent } from 'd3-array';
import { scaleLinear } from 'd3-scale';
import { type PointerEvent, useMemo, useRef, useState } from 'react';
import type { SignatureSet } from '../../../../shared/contracts/signature.ts';
import { ChartFrame } from '../../components/charts/chart-frame.tsx';
import { lineColour } from '../../components/charts/spectral-series.ts';
import { formatNumber } from '../../lib/format.ts';
import { useWidth } from '../../lib/use-width.ts';
import { ellipsePoints } from './ellipse-path.ts';

export interface Brush {
  x: [number, number];
  y: [number, number];
}

export interface FeatureScatterProps {
  set: SignatureSet;
  /** Places in `set.features`. */
  x: number;
  y: number;
  /** Places in `set.classes`. */
  shown: ReadonlySet<number>;
  /** In data units. */
  brush: Brush | null;
  onBrush: (brush: Brush | null) => void;
}

const NO_VALUES: readonly (number | null)[] = [];
const HEIGHT = 400;
const MARGIN = { top: 8, right: 10, bottom: 36, left: 52 };

/** Pixels of the samples over two bands or indices, with an ellipse for nine tenths of each class; drag to choose pixels. */
export function FeatureScatter({ set, x: fx, y: fy, shown, brush, onBrush }: FeatureScatterProps) {
  const [ref, width] = useWidth<HTMLDivElement>(560);
  const svg = useRef<SVGSVGElement>(null);
  const [from, setFrom] = useState<[number, number] | null>(null);
  const { points, features, classes } = set;
  const xs = points.values[fx] ?? NO_VALUES;
  const ys = points.values[fy] ?? NO_VALUES;
  const [xName, yName] = [features[fx]?.name ?? '', features[fy]?.name ?? ''];
  const x = scaleLinear(span(xs), [MARGIN.left, width - MARGIN.right]).nice();
  const y = scaleLinear(span(ys), [HEIGHT - MARGIN.bottom, MARGIN.top]).nice();
  const clouds = useMemo(
    () => drawClouds(points.classIndex, xs, ys, classes.length),
    [points.classIndex, xs, ys, classes.length],
  );
  const place = (event: PointerEvent): [number, number] => {
    const box = svg.current?.getBoundingClientRect();
    if (!box) return [0, 0];
    const [px, py] = [
      ((event.clientX - box.left) / box.width) * width,
      ((event.clientY - box.top) / box.height) * HEIGHT,
    ];
    return [
      x.invert(Math.min(width - MARGIN.right, Math.max(MARGIN.left, px))),
      y.invert(Math.min(HEIGHT - MARGIN.bottom, Math.max(MARGIN.top, py))),
    ];
  };
  const drag = (event: PointerEvent) => {
    if (!from) return;
    const to = place(event);
    onBrush({ x: order(from[0], to[0]), y: order(from[1], to[1]) });
  };
  const decimals = (f: number) => (features[f]?.quantity === 'reflectance' || features[f]?.kind === 'index' ? 2 : 0);
  return (
    <ChartFrame
      title={`${yName} by ${xName}`}
      isTitleHidden
      note={`At most ${set.pixelsPerSample} pixels of each sample. Ellipses hold nine tenths of a class, were it normal.`}
      data={{
        columns: [
          { name: 'Class' },
          { name: xName, isNumber: true, decimals: 4 },
          { name: yName, isNumber: true, decimals: 4 },
        ],
        rows: points.classIndex.flatMap((c, i) => (shown.has(c) ? [[classes[c]?.name, xs[i], ys[i]]] : [])),
      }}
    >
      <div ref={ref}>
        <svg
          ref={svg}
          role="img"
          aria-label={`${yName} by ${xName} of the samples’ pixels. The table has the figures; drag over the plot to choose pixels.`}
          viewBox={`0 0 ${width} ${HEIGHT}`}
          width={width}
          height={HEIGHT}
          className="block max-w-full cursor-crosshair touch-none select-none"
          fontSize="10.5"
          fontFamily="'Work Sans', sans-serif"
          onPointerDown={(event) => {
            event.currentTarget.setPointerCapture(event.pointerId);
            setFrom(place(event));
            onBrush(null);
          }}
          onPointerMove={drag}
          onPointerUp={() => setFrom(null)}
        >
          {x.ticks(width > 500 ? 7 : 4).map((tick) => (
            <g key={`x${tick}`}>
              <path d={`M${x(tick)} ${MARGIN.top}V${HEIGHT - MARGIN.bottom}`} stroke="var(--line)" />
              <text x={x(tick)} y={HEIGHT - MARGIN.bottom + 14} textAnchor="middle" fill="var(--ink-soft)">
                {formatNumber(tick, decimals(fx))}
              </text>
            </g>
          ))}
          {y.ticks(6).map((tick) => (
            <g key={`y${tick}`}>
              <path d={`M${MARGIN.left} ${y(tick)}H${width - MARGIN.right}`} stroke="var(--line)" />
              <text x={MARGIN.left - 6} y={y(tick) + 3.5} textAnchor="end" fill="var(--ink-soft)">
                {formatNumber(tick, decimals(fy))}
              </text>
            </g>
          ))}
          {classes.map(
            (one, c) =>
              shown.has(c) && (
                <path
                  key={one.classId}
                  d={(clouds[c] ?? []).map(([px, py]) => `M${x(px).toFixed(1)} ${y(py).toFixed(1)}h0`).join('')}
                  stroke={one.colour}
                  strokeWidth="3.4"
                  strokeLinecap="round"
                  strokeOpacity=".55"
                  fill="none"
                />
              ),
          )}
          {classes.map((one, c) => {
            const outline = shown.has(c) ? classEllipse(one, fx, fy, features.length) : [];
            if (outline.length === 0) return null;
            const d = outline.map(([px, py]) => `${x(px).toFixed(1)} ${y(py).toFixed(1)}`).join('L');
            return (
              <path key={one.classId} d={`M${d}Z`} fill="none" stroke={lineColour(one)} strokeWidth="1.8">
                <title>{one.name}</title>
              </path>
            );
          })}
          {brush && (
            <rect
              x={x(brush.x[0])}
              y={y(brush.y[1])}
              width={Math.max(1, x(brush.x[1]) - x(brush.x[0]))}
              height={Math.max(1, y(brush.y[0]) - y(brush.y[1]))}
              fill="var(--groundsel)"
              fillOpacity=".18"
              stroke="var(--ink)"
              strokeWidth="1.5"
            />
          )}
          <text x={width - MARGIN.right} y={HEIGHT - 4} textAnchor="end" fill="var(--ink-soft)">
            {xName}
          </text>
          <text transform={`translate(11 ${MARGIN.top}) rotate(-90)`} textAnchor="end" fill="var(--ink-soft)">
            {yName}
          </text>
        </svg>
      </div>
    </ChartFrame>
  );
}

function classEllipse(one: SignatureSet['classes'][number], fx: number, fy: number, nFeatures: number) {
  const [mx, my] = [one.mean[fx] ?? null, one.mean[fy] ?? null];
  const at = (f: number, g: number) => one.covariance[f * nFeatures + g] ?? Number.NaN;
  if (mx === null || my === null) return [];
  return ellipsePoints([mx, my], { xx: at(fx, fx), xy: at(fx, fy), yy: at(fy, fy) });
}

function drawClouds(
  classIndex: readonly number[],
  xs: readonly (number | null)[],
  ys: readonly (number | null)[],
  nClasses: number,
): [number, number][][] {
  const clouds: [number, number][][] = Array.from({ length: nClasses }, () => []);
  classIndex.forEach((c, i) => {
    const [px, py] = [xs[i] ?? null, ys[i] ?? null];
    if (px !== null && py !== null) clouds[c]?.push([px, py]);
  });
  return clouds;
}

function span(values: readonly (number | null)[]): [number, number] {
  const [low, high] = extent(values.filter((value) => value !== null));
  if (low === undefined || high === undefined) return [0, 1];
  return low < high ? [low, high] : [low - 1, high + 1];
}

function order(one: number, two: number): [number, number] {
  return one < two ? [one, two] : [two, one];
}
