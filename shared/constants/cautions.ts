/** Shown on the report, the client's page and each export. */
export const MAP_CAUTIONS = [
  'This map is an interpretation of imagery at its pixel size and date.',
  'It sets no legal or cadastral boundary.',
  'It is not for navigation, emergency response or fire safety.',
  'Patches below the minimum mapping unit and mixed pixels are unreliable.',
  'Where decisions touch safety, land rights or protected sites, follow local codes and have a licensed professional verify on the ground.',
] as const;

export const THERMAL_CAUTION =
  "Thermal values are at the thermal band's own, coarser footprint: one value covers several map pixels.";

/** Foody 2020 (Remote Sensing of Environment 239:111630); Pontius & Millones 2011 (International Journal of Remote Sensing 32:4407–4429). */
export const KAPPA_CAUTION =
  'Kappa is shown because clients ask for it. It is not a chance-corrected accuracy worth ranking maps by: at an overall accuracy of 95 % it can lie anywhere from −0.03 to 0.90, depending on how common the classes are (Foody 2020). Read overall, user’s and producer’s accuracy, and quantity and allocation disagreement (Pontius & Millones 2011), instead.';

export const PURPOSIVE_CAUTION =
  'Held-out samples were chosen by people, not drawn at random. These figures describe the samples; they do not estimate the accuracy of the map.';
