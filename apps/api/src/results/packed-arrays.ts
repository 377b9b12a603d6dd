import { promisify } from 'node:util';
import { deflate, inflate } from 'node:zlib';

const pack = promisify(deflate);
const unpack = promisify(inflate);

/** The four arrays of a result: spectrum and FID, real and imaginary. */
export interface ResultArrays {
  spectrum: { real: Float64Array; imag: Float64Array };
  fid: { real: Float64Array; imag: Float64Array };
}

/**
 * One block: two counts (points of the spectrum, of the FID) as 32-bit little-endian integers, then spectrum real, imag,
 * FID real, imag as little-endian doubles.
 */
export function toBytes({ spectrum, fid }: ResultArrays): Buffer {
  const header = Buffer.alloc(8);
  header.writeUInt32LE(spectrum.real.length, 0);
  header.writeUInt32LE(fid.real.length, 4);
  const arrays = [spectrum.real, spectrum.imag, fid.real, fid.imag];
  return Buffer.concat([
    header,
    ...arrays.map((array) => Buffer.from(array.buffer, array.byteOffset, array.byteLength)),
  ]);
}

export function fromBytes(bytes: Buffer): ResultArrays {
  const [points, samples] = [bytes.readUInt32LE(0), bytes.readUInt32LE(4)];
  let at = 8;
  const take = (count: number): Float64Array => {
    const array = new Float64Array(count);
    Buffer.from(array.buffer).set(bytes.subarray(at, at + 8 * count));
    at += 8 * count;
    return array;
  };
  const spectrum = { real: take(points), imag: take(points) };
  return { spectrum, fid: { real: take(samples), imag: take(samples) } };
}

export const packArrays = async (arrays: ResultArrays): Promise<Buffer> => pack(toBytes(arrays), { level: 1 });
export const unpackArrays = async (packed: Buffer): Promise<ResultArrays> => fromBytes(await unpack(packed));
