import type { How } from '../../shared/contracts/reference.ts';
import type { ZoneEstimates } from '../../shared/contracts/zone.ts';
import { reportDesign } from '../analysis/accuracy/design-report.ts';
import { countReferenceUnits } from '../analysis/accuracy/reference-units.ts';
import { estimateStratified } from '../analysis/accuracy/stratified-estimate.ts';
import type { App } from '../app-context.ts';
import type { ReferenceDesign } from '../entities/reference-design.ts';
import { NotFound } from '../errors.ts';
import { listRows, requireClosed, toUnits } from './design-estimates.ts';
import { presentFigure } from './design-figures.ts';
import { loadAnsweredPoints } from './design-settle.ts';
import { rasteriseZones } from './design-zone-raster.ts';
import { findRun } from './runs.ts';
import { placeScene } from './run-scene.ts';
import { requireZoneLayer } from './zone-layers.ts';

/** Fewer points say next to nothing of a zone (common practice, no source). */
const FEW_POINTS = 30;

/**
 * Accuracy and class shares of each zone from the points that fall into it: estimation for domains, in which the points of a
 * stratum outside the zone count as zeros (Cochran 1977, sec. 5A.14; Stehman 2014).
 * @throws Conflict "not-closed"; InvalidInput for a layer of another project or that does not reach the map
 */
export async function estimateZones(app: App, design: ReferenceDesign, layerId: string): Promise<ZoneEstimates> {
  requireClosed(design);
  const layer = await requireZoneLayer(app, design.projectId, layerId);
  const run = await findRun(app, design.runId);
  const placed = run && placeScene(run.scene);
  if (!placed) throw new NotFound();
  const zoneOf = rasteriseZones(placed, layer.zones);
  const points = (await loadAnsweredPoints(app, design.id)).filter(({ settled }) => settled !== null);
  const rows = listRows(design);
  const units = toUnits(points, rows).map((unit, i) => {
    const point = points[i]?.point;
    const zone = point ? (zoneOf[point.pixelRow * placed.grid.width + point.pixelColumn] ?? 0) : 0;
    return { ...unit, zone };
  });
  const sizes = design.strata.map(({ pixels, areaHa }) => ({ size: pixels, areaHa }));
  const zones = layer.zones.map(({ name, areaHa }, place) => {
    const inside = units.filter(({ zone }) => zone === place + 1).length;
    const samples = countReferenceUnits(units, sizes, rows.length, { zone: place + 1 });
    const estimate = inside > 0 ? estimateStratified(samples) : null;
    const report = estimate && reportDesign(estimate, { totalAreaHa: areaHa });
    const inputs: How['inputs'] = [
      { name: `points in ${name}`, value: inside },
      { name: 'points of the design', value: units.length },
    ];
    return {
      name,
      points: inside,
      overall: presentFigure(report?.overall ?? null, 'overall', inputs),
      classShares: design.classes.map((_, k) =>
        presentFigure(report?.perClass[k]?.areaShare ?? null, 'areaShare', inputs),
      ),
    };
  });
  const thin = zones.filter(({ points: n }) => n < FEW_POINTS).length;
  return {
    ...{ layerId: layer.id, layerName: layer.name, zones },
    classes: design.classes.map(({ id, name, colour }) => ({ id, name, colour })),
    cautions: [
      'How many points fall into a zone is chance, unless the zones were the strata; the intervals allow for that.',
      ...(thin > 0
        ? [`${thin} of ${zones.length} zones hold fewer than ${FEW_POINTS} points: read their intervals.`]
        : []),
    ],
  };
}
