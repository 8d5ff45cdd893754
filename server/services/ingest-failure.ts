import type { SceneFailure } from '../entities/scene.ts';
import { GdalProcessError, isFaultOfFile } from '../raster/gdal-process.ts';
import { SourceRefusal } from '../raster/source-refusal.ts';

/** Files that cannot become a scene together, for reasons no single file has. */
export class IngestRefusal extends Error {
  override readonly name = 'IngestRefusal';
  constructor(readonly failure: SceneFailure) {
    super(`Found ${failure.found}; wanted ${failure.wanted}. ${failure.advice}`);
  }
}

export const CANCELLED: SceneFailure = {
  code: 'cancelled',
  found: 'that the ingest was cancelled',
  wanted: 'an ingest that ran to its end',
  advice: 'Delete this scene and upload its files again when you want it.',
};

/** What the person is told of a failed ingest; a path of this machine is never part of it. */
export function describeIngestFailure(error: unknown): SceneFailure {
  if (error instanceof IngestRefusal) return error.failure;
  if (error instanceof SourceRefusal) {
    const { code, found, wanted, advice } = error;
    return { code, found, wanted, advice };
  }
  if (error instanceof GdalProcessError && error.reason === 'timeout') {
    return {
      code: 'too-slow',
      found: 'a file whose reading took longer than this server allows',
      wanted: 'files that are read within the limit',
      advice: 'Cut the scene to the study area, or ask the site administrator to raise the limit.',
    };
  }
  if (isFaultOfFile(error)) {
    return {
      code: 'unreadable',
      found: 'a file whose pixels cannot be read to the end',
      wanted: 'whole files',
      advice: 'Check that the file opens elsewhere, then upload it again.',
    };
  }
  const isDiskFull = (error as { code?: unknown } | null)?.code === 'ENOSPC';
  if (isDiskFull || (error instanceof GdalProcessError && error.reason === 'failed')) {
    return {
      code: 'no-resources',
      found: 'a file that takes more memory or disk to read than this server gives',
      wanted: 'files that are read within the limits',
      advice: 'Cut the scene to the study area, or ask the site administrator to raise the limits.',
    };
  }
  return {
    code: 'internal',
    found: 'an error of the server',
    wanted: 'a finished ingest',
    advice: 'Upload the files again. If it comes back, tell the site administrator when it happened.',
  };
}

/** A server that stopped again and again during the same ingest gave it up without a word in the scene's row. */
export function describeGivenUp(jobError: string | null): SceneFailure {
  return {
    code: 'given-up',
    found: jobError ?? 'an ingest that was given up',
    wanted: 'a finished ingest',
    advice: 'Delete this scene, cut its files to the study area and upload them again.',
  };
}
