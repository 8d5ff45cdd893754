import { promisify } from 'node:util';
import { constants, inflate, inflateSync } from 'node:zlib';
import { addDecoder, BaseDecoder, getDecoder } from 'geotiff';

const inflateAsync = promisify(inflate);
const deflateCompressions = [8, 32946];

/** geotiff's DEFLATE decoder replaced by the machine-code one in Node's zlib, many times as fast. */
class ZlibDecoder extends BaseDecoder {
  override decodeBlock(buffer: ArrayBufferLike): ArrayBufferLike {
    const inflated = inflateSync(new Uint8Array(buffer), zlibOptions(this.parameters));
    return takeBuffer(inflated);
  }
}

/** The same off the event loop, for threads that serve requests. */
class AsyncZlibDecoder extends BaseDecoder {
  override async decodeBlock(buffer: ArrayBufferLike): Promise<ArrayBufferLike> {
    return takeBuffer(await inflateAsync(new Uint8Array(buffer), zlibOptions(this.parameters)));
  }
}

// One output chunk of the block's size saves zlib from gluing many small ones.
function zlibOptions(parameters: BaseDecoder['parameters']): { chunkSize: number; finishFlush: number } {
  const bits = typeof parameters.bitsPerSample === 'number' ? parameters.bitsPerSample : parameters.bitsPerSample[0];
  const blockBytes = (parameters.tileWidth * parameters.tileHeight * bits) / 8;
  return { chunkSize: Math.max(64, blockBytes + 64), finishFlush: constants.Z_FINISH };
}

function takeBuffer(view: Uint8Array): ArrayBufferLike {
  if (view.byteOffset === 0 && view.byteLength === view.buffer.byteLength) return view.buffer;
  return view.buffer.slice(view.byteOffset, view.byteOffset + view.byteLength);
}

/** Makes every geotiff reader of this thread use zlib for DEFLATE; harmless to call again. */
export function registerZlibDecoder(mode: 'blocking' | 'async'): void {
  addDecoder(deflateCompressions, () => Promise.resolve(mode === 'blocking' ? ZlibDecoder : AsyncZlibDecoder));
}

export { getDecoder as getBlockDecoder };
