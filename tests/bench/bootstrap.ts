/**
 * Times the matrix of 100,000 held-out pixels in 20 classes and 2,000 replicates of the polygon bootstrap (target: under
 * 1 s together), for polygons of 100 pixels; smaller polygons, and so more of them, are timed and not judged.
 * Run: npm run bench:bootstrap
 */
import { confusionMatrixFromPairs } from '../../server/analysis/accuracy/confusion-matrix.ts';
import type { PolygonCounts } from '../../server/analysis/accuracy/polygon-agreement.ts';
import { bootstrapPolygons } from '../../server/analysis/accuracy/polygon-bootstrap.ts';
import { createRng } from '../../server/analysis/sampling/rng.ts';

const N_PIXELS = 100_000;
const N_CLASSES = 20;
const N_REPLICATES = 2000;
const LIMIT_SECONDS = 1;

/** Pixels of polygons in one class each, of which about four in five are mapped right. */
function makePixels(pixelsPerPolygon: number): { mapped: Uint8Array; reference: Uint8Array; polygon: Uint32Array } {
  const rng = createRng(20);
  const reference = new Uint8Array(N_PIXELS);
  const mapped = new Uint8Array(N_PIXELS);
  const polygon = new Uint32Array(N_PIXELS);
  for (let i = 0; i < N_PIXELS; i++) {
    polygon[i] = Math.floor(i / pixelsPerPolygon);
    reference[i] = polygon[i] % N_CLASSES;
    mapped[i] = rng.nextFloat() < 0.8 ? reference[i] : rng.nextBelow(N_CLASSES);
  }
  return { mapped, reference, polygon };
}

let isSlow = false;
for (const pixelsPerPolygon of [100, 20, 5]) {
  const { mapped, reference, polygon } = makePixels(pixelsPerPolygon);
  for (const interval of ['percentile', 'bca'] as const) {
    const start = performance.now();
    const matrix = confusionMatrixFromPairs(mapped, reference, N_CLASSES);
    const polygons: PolygonCounts[] = Array.from({ length: N_PIXELS / pixelsPerPolygon }, (_, id) => ({
      id: String(id),
      referenceClass: id % N_CLASSES,
      mappedCounts: new Float64Array(N_CLASSES),
    }));
    for (let i = 0; i < N_PIXELS; i++) (polygons[polygon[i]].mappedCounts as Float64Array)[mapped[i]]++;
    const counted = performance.now();
    const { overall } = bootstrapPolygons(polygons, N_CLASSES, { seed: 1, nReplicates: N_REPLICATES, interval });
    const seconds = (performance.now() - start) / 1000;
    isSlow ||= seconds > LIMIT_SECONDS && pixelsPerPolygon === 100;
    console.log(
      `${polygons.length} polygons of ${pixelsPerPolygon} px, ${interval}: ${seconds.toFixed(3)} s ` +
        `(counting ${((counted - start) / 1000).toFixed(3)} s), overall ${overall.value!.toFixed(4)} ` +
        `[${overall.low!.toFixed(4)}, ${overall.high!.toFixed(4)}] of ${matrix.counts.reduce((a, b) => a + b, 0)} px`,
    );
  }
}
if (isSlow) {
  console.error(`Slower than ${LIMIT_SECONDS} s.`);
  process.exitCode = 1;
}
