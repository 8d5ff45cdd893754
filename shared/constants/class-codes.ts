/** Code of a pixel that no class was given to; never a class's own. */
export const UNCLASSIFIED_CODE = 0;
/** Code of a pixel with no data or outside the study area. */
export const NODATA_CODE = 255;
export const MIN_CLASS_CODE = 1;
export const MAX_CLASS_CODE = 254;
