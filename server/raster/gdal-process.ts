import { spawn } from 'node:child_process';
import { isAbsolute } from 'node:path';

export type GdalTool =
  'gdalinfo' | 'gdal_translate' | 'gdaladdo' | 'gdalsrsinfo' | 'gdaltransform' | 'gdalwarp' | 'ogr2ogr' | 'ogrinfo';

/** Why a GDAL tool did not deliver. */
export type GdalFailure = 'failed' | 'timeout' | 'aborted' | 'too-much-output' | 'not-installed';

/** A GDAL tool that failed, was stopped, or could not be started; `stderr` holds what it said. */
export class GdalProcessError extends Error {
  override readonly name = 'GdalProcessError';
  constructor(
    readonly tool: GdalTool,
    readonly reason: GdalFailure,
    readonly exitCode: number | null,
    readonly stderr: string,
  ) {
    super(`${tool} ${describeFailure(reason, exitCode)}${stderr === '' ? '' : `: ${stderr}`}`);
  }
}

function describeFailure(reason: GdalFailure, exitCode: number | null): string {
  if (reason === 'timeout') return 'was stopped because it took too long';
  if (reason === 'aborted') return 'was cancelled';
  if (reason === 'too-much-output') return 'was stopped because it printed more than it may';
  if (reason === 'not-installed') return 'could not be started; install the packages gdal-bin and util-linux';
  return exitCode === null ? 'was killed' : `failed with exit code ${exitCode}`;
}

export interface GdalRunOptions {
  /** `upload`: a file of unknown origin, opened by the fixed driver list only; `own`: files this server wrote. */
  origin: 'upload' | 'own';
  timeoutMs?: number;
  /** Limit on the address space of the child. */
  memoryBytes?: number;
  signal?: AbortSignal | undefined;
  /** Called with a rising fraction 0–1 for tools that print GDAL's progress dots. */
  onProgress?: ((fraction: number) => void) | undefined;
  stdin?: string;
  maxOutputBytes?: number;
  config?: Record<string, string>;
}

/** The only drivers that may open an upload, by tool; GTiff also reads COG. The vector tools have no such option: see read-vector.ts. */
const rasterDrivers = ['GTiff', 'JP2OpenJPEG'];
const uploadDrivers: Partial<Record<GdalTool, readonly string[]>> = {
  gdalinfo: rasterDrivers,
  gdal_translate: rasterDrivers,
};
const stderrTailBytes = 4000;

const sharedConfig: Record<string, string> = {
  GDAL_CACHEMAX: '256',
  GDAL_NUM_THREADS: '1',
  GDAL_DISABLE_READDIR_ON_OPEN: 'EMPTY_DIR',
  GDAL_PAM_ENABLED: 'NO',
  PROJ_NETWORK: 'OFF',
  CPL_VSIL_CURL_ALLOWED_EXTENSIONS: '{noext}',
  CPL_VSIL_CURL_ALLOWED_FILENAME: '/nowhere',
  GDAL_HTTP_TIMEOUT: '1',
  GDAL_HTTP_MAX_RETRY: '0',
};
const uploadConfig: Record<string, string> = {
  // An upload's georeference must stand inside the file, so that a neighbouring file can't change what it means.
  GDAL_GEOREF_SOURCES: 'INTERNAL',
  // Formats that name other files or servers to read from.
  GDAL_SKIP: 'VRT DERIVED WMS WCS WMTS',
  OGR_SKIP: 'OGR_VRT,WFS,OAPIF,CSW,CARTO,AmigoCloud,PLSCENES,NGW,ODBC,PGeo,MSSQLSpatial,PostgreSQL,MySQL,HTTP',
};

/**
 * Runs a GDAL tool as a child process, without a shell, with time, memory and output limits.
 * Uploads are opened only by the drivers in `uploadDrivers`; sidecar files, virtual file systems and the network are off.
 * @throws {GdalProcessError} when the tool fails, is stopped by a limit or by the signal, or isn't installed.
 * @throws {RangeError} when an argument names a virtual file system.
 */
export function runGdal(
  tool: GdalTool,
  args: readonly string[],
  options: GdalRunOptions,
): Promise<{ stdout: string; stderr: string }> {
  for (const arg of args) {
    if (/^\/vsi/i.test(arg)) throw new RangeError(`GDAL argument names a virtual file system: ${arg}`);
  }
  const { timeoutMs = 120_000, memoryBytes = 2 * 1024 ** 3, maxOutputBytes = 16 * 1024 ** 2, signal } = options;
  if (signal?.aborted) return Promise.reject(new GdalProcessError(tool, 'aborted', null, ''));
  const drivers = options.origin === 'upload' ? (uploadDrivers[tool] ?? []) : [];
  const driverArgs = drivers.flatMap((driver) => ['-if', driver]);
  const cpuSeconds = Math.ceil(timeoutMs / 1000) * 4;
  const limits = [`--as=${memoryBytes}`, `--cpu=${cpuSeconds}`, '--core=0', '--', tool];

  return new Promise((resolve, reject) => {
    // prlimit replaces itself by the tool, so killing the child kills the tool.
    const child = spawn('prlimit', [...limits, ...driverArgs, ...args], {
      shell: false,
      stdio: ['pipe', 'pipe', 'pipe'],
      env: {
        PATH: process.env['PATH'] ?? '/usr/bin:/bin',
        LC_ALL: 'C',
        ...sharedConfig,
        ...(options.origin === 'upload' ? uploadConfig : {}),
        ...options.config,
      },
    });
    const stdoutParts: Buffer[] = [];
    let stdoutBytes = 0;
    let stderr = '';
    let stopped: GdalFailure | null = null;
    const stop = (reason: GdalFailure): void => {
      stopped ??= reason;
      child.kill('SIGKILL');
    };
    const timer = setTimeout(() => stop('timeout'), timeoutMs);
    const onAbort = (): void => stop('aborted');
    signal?.addEventListener('abort', onAbort, { once: true });
    const reportProgress = options.onProgress ? createProgressReader(options.onProgress) : null;

    child.stdout.on('data', (chunk: Buffer) => {
      stdoutBytes += chunk.length;
      if (stdoutBytes > maxOutputBytes) return stop('too-much-output');
      stdoutParts.push(chunk);
      reportProgress?.(chunk.toString('latin1'));
    });
    child.stderr.on('data', (chunk: Buffer) => {
      stderr = (stderr + chunk.toString('utf8')).slice(-stderrTailBytes);
    });
    const finish = (): void => {
      clearTimeout(timer);
      signal?.removeEventListener('abort', onAbort);
    };
    child.on('error', (error: NodeJS.ErrnoException) => {
      finish();
      reject(error.code === 'ENOENT' ? new GdalProcessError(tool, 'not-installed', null, error.message) : error);
    });
    child.on('close', (exitCode) => {
      finish();
      const said = stderr.trim();
      // prlimit exits with 127 where it can't find the tool.
      if (stopped === null && exitCode === 127) stopped = 'not-installed';
      if (stopped !== null || exitCode !== 0) {
        reject(new GdalProcessError(tool, stopped ?? 'failed', exitCode, said));
      } else {
        resolve({ stdout: Buffer.concat(stdoutParts).toString('utf8'), stderr: said });
      }
    });
    // A tool that dies before it has read its input closes the pipe; its exit code says what happened.
    child.stdin.on('error', (error: NodeJS.ErrnoException) => {
      if (error.code !== 'EPIPE') stderr += error.message;
    });
    child.stdin.end(options.stdin ?? '');
  });
}

/** Whether the tool failed because of what is in the file it read, not because this machine ran out of something. */
export function isFaultOfFile(error: unknown): error is GdalProcessError {
  return (
    error instanceof GdalProcessError &&
    error.reason === 'failed' &&
    error.exitCode !== null &&
    !/memory|bad_alloc|no space left|permission denied|write/i.test(error.stderr)
  );
}

/** Refuses anything but an absolute path on the local disk. */
export function requireLocalPath(path: string): string {
  if (!isAbsolute(path) || /^\/vsi/i.test(path)) throw new RangeError(`expected an absolute local path, got ${path}`);
  return path;
}

/** Reads GDAL's "0...10...20… 100 - done." from its pieces and reports 0–1; each dot is a thirtieth. */
export function createProgressReader(onProgress: (fraction: number) => void): (text: string) => void {
  let unfinished = '';
  let reported = 0;
  return (text) => {
    const lines = (unfinished + text).split('\n');
    unfinished = lines.at(-1) ?? '';
    for (const line of lines) {
      if (!line.startsWith('0.')) continue;
      const fraction = Math.min(1, (line.split('.').length - 1) / 30);
      if (fraction > reported) {
        reported = fraction;
        onProgress(fraction);
      }
    }
  };
}
