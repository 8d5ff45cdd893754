export type SourceRefusalCode =
  | 'not-a-raster'
  | 'unreadable'
  | 'no-bands'
  | 'too-many-bands'
  | 'too-many-pixels'
  | 'complex'
  | 'unsupported-type'
  | 'no-crs'
  | 'unsupported-crs'
  | 'no-transform'
  | 'rotated'
  | 'all-nodata';

/** A raster that can't become a scene, with what was found, what is wanted and how to get there. */
export class SourceRefusal extends Error {
  override readonly name = 'SourceRefusal';
  constructor(
    readonly code: SourceRefusalCode,
    readonly found: string,
    readonly wanted: string,
    readonly advice: string,
  ) {
    super(`Found ${found}; wanted ${wanted}. ${advice}`);
  }
}
