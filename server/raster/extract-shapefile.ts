import { createWriteStream } from 'node:fs';
import { join } from 'node:path';
import { pipeline } from 'node:stream/promises';
import yauzl from 'yauzl';
import { VectorRefusal } from './vector-refusal.ts';

/** Parts of a Shapefile that matter: shapes, index, table, reference system, encoding. */
const PARTS = ['shp', 'shx', 'dbf', 'prj', 'cpg'];
const MAX_BYTES = 512 * 1024 ** 2;

/**
 * Unpacks the first Shapefile of a zip under a name of our own, so that no entry decides where it is written.
 * @returns path of the .shp
 * @throws VectorRefusal when the zip is damaged, too large, or holds no Shapefile
 */
export async function extractShapefile(zipPath: string, dir: string): Promise<string> {
  const zip = await openZip(zipPath);
  try {
    const entries = await listEntries(zip);
    const shape = entries.find(({ fileName }) => /\.shp$/i.test(fileName) && !fileName.startsWith('__MACOSX'));
    if (!shape) throw new VectorRefusal('the zip holds no .shp');
    const stem = shape.fileName.slice(0, -4).toLowerCase();
    let total = 0;
    for (const part of PARTS) {
      const entry = entries.find(({ fileName }) => fileName.toLowerCase() === `${stem}.${part}`);
      if (!entry) continue;
      total += entry.uncompressedSize;
      if (total > MAX_BYTES) throw new VectorRefusal('its Shapefile is larger than 512 MB unpacked');
      await writeEntry(zip, entry, join(dir, `shapes.${part}`));
    }
    return join(dir, 'shapes.shp');
  } finally {
    zip.close();
  }
}

function openZip(path: string): Promise<yauzl.ZipFile> {
  return new Promise((resolve, reject) => {
    yauzl.open(path, { lazyEntries: true, autoClose: false }, (error, zip) => {
      if (error) reject(new VectorRefusal('the zip is damaged'));
      else resolve(zip);
    });
  });
}

function listEntries(zip: yauzl.ZipFile): Promise<yauzl.Entry[]> {
  return new Promise((resolve, reject) => {
    const entries: yauzl.Entry[] = [];
    zip.on('entry', (entry: yauzl.Entry) => {
      entries.push(entry);
      if (entries.length > 1_000) reject(new VectorRefusal('the zip holds more than 1000 files'));
      else zip.readEntry();
    });
    zip.once('end', () => resolve(entries));
    zip.once('error', () => reject(new VectorRefusal('the zip is damaged')));
    zip.readEntry();
  });
}

async function writeEntry(zip: yauzl.ZipFile, entry: yauzl.Entry, path: string): Promise<void> {
  const stream = await new Promise<NodeJS.ReadableStream>((resolve, reject) => {
    zip.openReadStream(entry, (error, opened) => {
      if (error) reject(new VectorRefusal('the zip is damaged'));
      else resolve(opened);
    });
  });
  await pipeline(stream, createWriteStream(path, { flags: 'wx' }));
}
