import type { Band, Scene } from '../../../../shared/contracts/scene.ts';
import { QUANTITY_AXIS } from '../../components/charts/spectral-series.ts';
import { Histogram } from '../../components/charts/histogram.tsx';

/** The histogram of every band, in stored values or in what they stand for. */
export function BandHistograms({ scene, isScaled }: { scene: Scene; isScaled: boolean }) {
  return (
    <div className="grid gap-4 sm:grid-cols-2 xl:grid-cols-3">
      {scene.bands.map((band) => (
        <div key={band.id} className="rounded-xl border border-line bg-card px-4 pt-3 pb-3">
          <BandHistogram band={band} isScaled={isScaled} />
        </div>
      ))}
    </div>
  );
}

function BandHistogram({ band, isScaled }: { band: Band; isScaled: boolean }) {
  const { low, high, counts } = band.statistics.histogram;
  const { scale, offset } = isScaled ? band : { scale: 1, offset: 0 };
  const [from, to] = [low * scale + offset, high * scale + offset];
  return (
    <Histogram
      title={`${band.number} · ${band.name}`}
      counts={scale < 0 ? [...counts].reverse() : counts}
      low={Math.min(from, to)}
      high={Math.max(from, to)}
      axisLabel={isScaled && (scale !== 1 || offset !== 0) ? QUANTITY_AXIS[band.quantity] : 'stored value (DN)'}
      decimals={Math.abs(to - from) < 10 ? 2 : 0}
    />
  );
}
