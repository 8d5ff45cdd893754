import { formatBytes, formatCount } from '../../lib/format.ts';

/** What the server takes of one upload. */
export interface UploadLimits {
  fileBytes: number;
  files: number;
}

type FileFacts = Pick<File, 'name' | 'size'>;

/** What is wrong with one chosen file; only `refusal` keeps the upload from starting. */
export interface FileCheck {
  kind: 'refusal' | 'doubt';
  text: string;
}

const KNOWN_ENDINGS = /\.(tiff?|jp2|j2k|jpf|jpx)$/i;

/** Checks a file by what the browser knows; what is inside is the server's to read. null when nothing is to be said. */
export function checkFile(file: FileFacts, limits: UploadLimits | null): FileCheck | null {
  if (file.size === 0) return { kind: 'refusal', text: 'It is empty.' };
  if (limits && file.size > limits.fileBytes) {
    return { kind: 'refusal', text: `It is above this server’s limit of ${formatBytes(limits.fileBytes)} a file.` };
  }
  if (!KNOWN_ENDINGS.test(file.name)) {
    return { kind: 'doubt', text: 'The ending is none of .tif, .tiff, .jp2. The server will look inside.' };
  }
  return null;
}

/** What is wrong with the choice as a whole, or null. */
export function checkCount(nFiles: number, limits: UploadLimits | null): string | null {
  if (!limits || nFiles <= limits.files) return null;
  return `A scene takes at most ${formatCount(limits.files, 'file')}; ${formatCount(nFiles, 'file')} are chosen.`;
}

/** The files with `added` behind them, each once: the same name and size is the same file. */
export function joinFiles<T extends FileFacts>(files: readonly T[], added: readonly T[]): T[] {
  const joined = [...files];
  for (const file of added) {
    if (!joined.some(({ name, size }) => name === file.name && size === file.size)) joined.push(file);
  }
  return joined;
}
