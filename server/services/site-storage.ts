import { statfs } from 'node:fs/promises';
import type { App } from '../app-context.ts';
import { NoRoom } from '../errors.ts';

/** Bands are written anew from an upload, with overviews and a working copy, before the upload is removed. */
const ROOM_PER_UPLOADED_BYTE = 3;
/** Left for the database and logs. */
const SPARE_BYTES = 256 * 1024 * 1024;

async function measureFreeBytes(app: App): Promise<number> {
  const disk = await statfs(app.config.dataDir);
  return disk.bavail * disk.bsize;
}

/** Bytes of stored files by kind, and what the disk has left. */
export async function measureStorage(app: App) {
  const [sceneBytes, runBytes, incomingBytes, freeBytes] = await Promise.all([
    app.files.usedBytes('scenes/'),
    app.files.usedBytes('runs/'),
    app.files.usedBytes('incoming/'),
    measureFreeBytes(app),
  ]);
  return { sceneBytes, runBytes, incomingBytes, freeBytes };
}

/** Refuses an upload that the disk has no room for, before its first byte is stored. @throws NoRoom */
export async function checkRoom(app: App, uploadBytes: number): Promise<void> {
  const freeBytes = await measureFreeBytes(app);
  const neededBytes = uploadBytes * ROOM_PER_UPLOADED_BYTE + SPARE_BYTES;
  if (freeBytes >= neededBytes) return;
  const megabytes = (bytes: number) => `${Math.ceil(bytes / 1e6)} MB`;
  throw new NoRoom('The server’s disk has no room for this upload.', {
    found: `${megabytes(freeBytes)} free`,
    wanted: `${megabytes(neededBytes)} free: three times the upload and a reserve`,
    advice: 'Delete scenes or runs that are no longer needed, or ask the site administrator for more room.',
  });
}
