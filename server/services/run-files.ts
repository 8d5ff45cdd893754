import type { RunLayer } from '../../shared/contracts/run.ts';

/** Keys of a run's files. What lies under `parts/` and `strips/` is work in progress and goes once the map stands. */
export function runFiles(runId: string) {
  const root = `runs/${runId}/`;
  const numbered = (folder: string, number: number) => `${root}${folder}/${String(number).padStart(5, '0')}.bin`;
  return {
    root,
    training: `${root}training.json`,
    parts: `${root}parts/`,
    part: (number: number) => numbered('parts', number),
    model: `${root}model.bin`,
    strips: `${root}strips/`,
    strip: (number: number) => numbered('strips', number),
    /** Strips of a layer; those of the classes are written last, so that a strip that has them is whole. */
    layerStrips: (layer: RunLayer) => `${root}${layer}-strips/`,
    layerStrip: (layer: RunLayer, number: number) => numbered(`${layer}-strips`, number),
    layer: (layer: RunLayer) => `${root}${layer}.tif`,
    map: `${root}class-map.tif`,
    mapNames: `${root}class-map.tif.aux.xml`,
    /** The map after the steps of a revision of the post-processing list. */
    revisionMap: (number: number) => `${root}revisions/${number}/class-map.tif`,
    revisionMapNames: (number: number) => `${root}revisions/${number}/class-map.tif.aux.xml`,
    previews: `${root}previews/`,
    preview: (previewId: string) => `${root}previews/${previewId}.tif`,
    previewFigures: (previewId: string) => `${root}previews/${previewId}.json`,
  };
}
