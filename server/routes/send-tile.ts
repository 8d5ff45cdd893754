import type { Request, Response } from 'express';
import type { PlannedTile } from '../services/tiles.ts';

/** Answers with a planned tile; it is drawn only when the browser has no copy, and not for a browser that has gone. */
export async function sendTile(req: Request, res: Response, tile: PlannedTile): Promise<undefined> {
  res.setHeader('ETag', tile.etag);
  res.setHeader('Cache-Control', tile.cacheControl);
  if (req.fresh) {
    res.status(304).end();
    return undefined;
  }
  const left = new AbortController();
  const leave = () => left.abort();
  res.once('close', leave);
  try {
    const bytes = await tile.draw(left.signal);
    res.type('image/webp').setHeader('Content-Length', bytes.byteLength).end(bytes);
  } catch (error) {
    // Nobody is there to answer; the work never began.
    if (!left.signal.aborted) throw error;
    res.destroy();
  } finally {
    res.off('close', leave);
  }
  return undefined;
}
