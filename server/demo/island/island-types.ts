/** One band of a scene as the sensor delivers it: value = DN × scale + offset. */
export interface IslandBand {
  name: string;
  role: 'blue' | 'green' | 'red' | 'nir' | 'swir1' | 'swir2' | 'thermal';
  /** Centre wavelength, µm. */
  wavelengthUm: number;
  /** Ground sample distance, metres. */
  gsdMeters: number;
  width: number;
  height: number;
  /** Digital numbers, row-major from the north-west corner. */
  dn: Uint16Array;
  /** Reflectance, or kelvin for the thermal band, per digital number. */
  scale: number;
  offset: number;
  nodata: number;
}

/** One acquisition: six reflective bands at 30 m and a thermal band at 90 m from the same corner. */
export interface IslandScene {
  name: string;
  /** yyyy-mm-dd */
  acquiredOn: string;
  bands: IslandBand[];
}

/** The whole invented island. */
export interface Island {
  width: 1200;
  height: 1000;
  /** Easting and northing of the grid's north-west corner (pixel corner, not centre), metres. */
  originX: number;
  originY: number;
  pixelMeters: 30;
  epsg: 32628;
  /** True class of each pixel on the late-summer date, 1–10 in the order of the class scheme. */
  trueClass: Uint8Array;
  scenes: [spring: IslandScene, lateSummer: IslandScene];
}
