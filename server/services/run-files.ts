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
    map: `${root}class-map.tif`,
    mapNames: `${root}class-map.tif.aux.xml`,
  };
}
