/** Columns of the 30 m grid. */
export const ISLAND_WIDTH = 1200;
/** Rows of the 30 m grid. */
export const ISLAND_HEIGHT = 1000;
/** Pixels of the 30 m grid. */
export const ISLAND_PIXELS = ISLAND_WIDTH * ISLAND_HEIGHT;
/** Pixel size in metres. */
export const PIXEL_METERS = 30;
/** Easting of the grid's west edge, metres, EPSG:32628. */
export const ORIGIN_X = 400_800;
/** Northing of the grid's north edge, metres, EPSG:32628. */
export const ORIGIN_Y = 6_601_200;
/** UTM zone 28N. */
export const ISLAND_EPSG = 32628;

/** The eight neighbours as column steps, starting east and turning towards south. */
export const STEP_X = [1, 1, 0, -1, -1, -1, 0, 1] as const;
/** The eight neighbours as row steps, in the order of {@link STEP_X}. */
export const STEP_Y = [0, 1, 1, 1, 0, -1, -1, -1] as const;
/** Length of each neighbour step in pixels. */
export const STEP_LENGTH = [1, Math.SQRT2, 1, Math.SQRT2, 1, Math.SQRT2, 1, Math.SQRT2] as const;
