import { statfs } from 'node:fs/promises';
import type { App } from '../app-context.ts';

/** Bytes of stored files by kind, and what the disk has left. */
export async function measureStorage(app: App) {
  const [sceneBytes, runBytes, incomingBytes, disk] = await Promise.all([
    app.files.usedBytes('scenes/'),
    app.files.usedBytes('runs/'),
    app.files.usedBytes('incoming/'),
    statfs(app.config.dataDir),
  ]);
  return { sceneBytes, runBytes, incomingBytes, freeBytes: disk.bavail * disk.bsize };
}
