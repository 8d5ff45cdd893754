import { TileLayer } from 'react-leaflet';
import { type Bounds, toLatLngBounds } from './base-map.tsx';

export interface SceneTileLayerProps {
  /** Template with {z}, {x} and {y}: a composite, an index or a class map of our own server. */
  url: string;
  /** Where the raster lies; no tile is asked for outside. */
  bounds?: Bounds;
  /** The finest zoom the server draws; beyond it pixels are enlarged, not smoothed. */
  maxNativeZoom?: number;
  opacity?: number;
  zIndex?: number;
}

const EMPTY_TILE = 'data:image/gif;base64,R0lGODlhAQABAAAAACH5BAEKAAEALAAAAAABAAEAAAICTAEAOw==';

/** Tiles of a raster. Another `url` replaces the tiles at once. */
export function SceneTileLayer({ url, bounds, maxNativeZoom = 14, opacity = 1, zIndex = 1 }: SceneTileLayerProps) {
  return (
    <TileLayer
      key={bounds?.join(' ')}
      url={url}
      {...(bounds && { bounds: toLatLngBounds(bounds) })}
      className="scene-tiles"
      maxNativeZoom={maxNativeZoom}
      maxZoom={22}
      opacity={opacity}
      zIndex={zIndex}
      keepBuffer={2}
      errorTileUrl={EMPTY_TILE}
    />
  );
}
