/** Codes of the demo's ten land-cover classes, in the order of its class scheme. */
export const CLASS = {
  openWater: 1,
  tidalFlat: 2,
  saltmarsh: 3,
  broadleafWoodland: 4,
  coniferPlantation: 5,
  heathAndMoor: 6,
  improvedPasture: 7,
  arable: 8,
  bareRock: 9,
  builtUp: 10,
} as const;

export const N_CLASSES = 10;
