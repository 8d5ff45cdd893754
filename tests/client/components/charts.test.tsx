import { render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { describe, expect, it, vi } from 'vitest';
import { Histogram, clippedShare } from '../../../client/src/components/charts/histogram.tsx';
import { IntervalBar } from '../../../client/src/components/charts/interval-bar.tsx';
import { SpectralProfile } from '../../../client/src/components/charts/spectral-profile.tsx';
import { spectralRegionAt } from '../../../client/src/components/charts/spectral-regions.ts';
import type { SpectralSeries } from '../../../client/src/components/charts/spectral-series.ts';
import { svgText } from '../../../client/src/components/charts/svg-text.ts';

const point = (wavelengthUm: number, mean: number, quantity: 'reflectance' | 'kelvin' = 'reflectance') => ({
  wavelengthUm,
  mean,
  sd: 0.01,
  bandName: `band at ${wavelengthUm}`,
  quantity,
});
const series: SpectralSeries[] = [
  {
    id: 's',
    name: 'This sample',
    colour: '#299785',
    isMain: true,
    points: [point(2.2, 0.09), point(0.5, 0.04), point(1.6, 0.16), point(10.9, 289.4, 'kelvin')],
  },
];
const markers = (container: HTMLElement) =>
  [...container.querySelectorAll('circle')].map((circle) => ({
    title: circle.textContent,
    x: Number(circle.getAttribute('cx')),
    y: Number(circle.getAttribute('cy')),
  }));

describe('a spectral profile', () => {
  it('stands on a true wavelength axis: equal steps in µm are equal steps on the page', () => {
    const { container } = render(<SpectralProfile series={series} />);
    const at = (um: string) => markers(container).find((marker) => marker.title.includes(`${um} µm`))!.x;
    expect((at('1.60') - at('0.50')) / (at('2.20') - at('1.60'))).toBeCloseTo(1.1 / 0.6, 5);
  });

  it('keeps the thermal band on a panel of its own, with its own axis', () => {
    const { container } = render(<SpectralProfile series={series} />);
    const all = markers(container);
    const thermal = all.find((marker) => marker.title.includes('10.90 µm'))!;
    expect(thermal.x).toBeGreaterThan(
      Math.max(...all.filter((marker) => marker !== thermal).map((marker) => marker.x)) + 20,
    );
    expect(screen.getByText('TIR')).toBeInTheDocument();
    expect(screen.getByText('K')).toBeInTheDocument();
  });

  it('joins no line from the shortwave to the thermal', () => {
    const { container } = render(<SpectralProfile series={series} />);
    const lines = [...container.querySelectorAll('figure path[fill="none"]')].map(
      (path) => path.getAttribute('d') ?? '',
    );
    const reach = lines.flatMap((d) => [...d.matchAll(/[ML]([\d.]+),/g)].map((match) => Number(match[1])));
    const thermal = markers(container).find((marker) => marker.title.includes('10.90 µm'))!;
    expect(reach.length).toBeGreaterThan(0);
    expect(Math.max(...reach)).toBeLessThan(thermal.x);
  });

  it('has the same figures as a table', async () => {
    render(<SpectralProfile series={series} />);
    await userEvent.click(screen.getByRole('radio', { name: 'Table' }));
    const rows = within(screen.getByRole('table', { name: 'Spectral profile' })).getAllByRole('row');
    expect(rows).toHaveLength(1 + series[0].points.length);
    expect(rows[1]).toHaveTextContent('2.20');
    expect(rows[1]).toHaveTextContent('0.0900');
  });

  it('without any series draws and says so', () => {
    render(<SpectralProfile series={[]} />);
    expect(screen.getByRole('img')).toHaveAccessibleName('Spectral profile without any series.');
  });

  it('saves as SVG text that stands alone', () => {
    const { container } = render(<SpectralProfile series={series} />);
    const chart = container.querySelector<SVGSVGElement>('svg[role=img]')!;
    // jsdom does not read the viewBox attribute.
    Object.defineProperty(chart, 'viewBox', { value: { baseVal: { width: 324, height: 214 } } });
    const text = svgText(chart);
    const parsed = new DOMParser().parseFromString(text, 'image/svg+xml');
    expect(parsed.querySelector('parsererror')).toBeNull();
    expect(parsed.documentElement.getAttribute('width')).toBe('324');
    expect(parsed.querySelectorAll('circle')).toHaveLength(4);
    expect(parsed.querySelector('[class]')).toBeNull();
  });
});

describe('the named regions', () => {
  it.each([
    [0.56, 'visible'],
    [0.86, 'NIR'],
    [2.2, 'SWIR'],
    [10.9, 'TIR'],
    [5, undefined],
  ])('%d µm lies in %s', (um, name) => {
    expect(spectralRegionAt(um)?.name).toBe(name);
  });
});

describe('a histogram', () => {
  it('moves its stretch by the keyboard and tells both ends', async () => {
    const change = vi.fn();
    render(
      <Histogram
        title="Red"
        counts={[10, 20, 30, 40]}
        low={0}
        high={1}
        axisLabel="reflectance"
        stretch={{ low: 0.2, high: 0.8 }}
        onStretchChange={change}
      />,
    );
    screen.getByRole('slider', { name: 'Red: drawn darkest' }).focus();
    await userEvent.keyboard('{ArrowRight}');
    expect(change.mock.lastCall?.[0].low).toBeCloseTo(0.202, 6);
    expect(change.mock.lastCall?.[0].high).toBe(0.8);
  });

  it('counts clipped pixels in proportion within a bin', () => {
    expect(clippedShare([10, 20, 30, 40], 0, 0.25, { low: 0.25, high: 1 })).toEqual({ below: 0.1, above: 0 });
    const half = clippedShare([10, 20, 30, 40], 0, 0.25, { low: 0.125, high: 0.875 });
    expect(half.below).toBeCloseTo(0.05, 12);
    expect(half.above).toBeCloseTo(0.2, 12);
  });

  it('of nothing clips nothing', () => {
    expect(clippedShare([0, 0], 0, 0.5, { low: 0.5, high: 0.6 })).toEqual({ below: 0, above: 0 });
  });
});

describe('an interval bar', () => {
  it('says value, interval and tick, and draws them to scale', () => {
    const { container } = render(
      <IntervalBar label="Arable, ha" value={50} low={40} high={60} tick={70} max={100} colour="#D18543" />,
    );
    expect(screen.getByRole('img')).toHaveAccessibleName('Arable, ha: 50, from 40 to 60, tick at 70');
    expect(container.querySelector('rect')).toHaveAttribute('width', '50.00%');
    expect(container.querySelector('line[stroke="var(--rust)"]')).toHaveAttribute('x1', '70.00%');
  });

  it('of an undefined figure draws no bar of nought', () => {
    const { container } = render(
      <IntervalBar label="Rock" value={null} low={null} high={null} max={1} colour="#A4B1C1" />,
    );
    expect(container.querySelector('rect')).toBeNull();
    expect(screen.getByRole('img')).toHaveAccessibleName('Rock: –');
  });
});
