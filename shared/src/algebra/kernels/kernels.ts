import { KERNELS_BASE64 } from './kernels.wasm.js';

/** The compiled functions of shared/assembly/kernels.ts; pointers and row distances in bytes, see there. */
export interface Kernels {
  readonly memory: WasmMemory;
  dot(n: number, x: number, y: number): number;
  scale(n: number, factor: number, x: number): void;
  rotate(n: number, x: number, y: number, cosine: number, sine: number): void;
  dotRows(rows: number, n: number, a: number, ld: number, x: number, out: number): void;
  addRows(rows: number, n: number, a: number, ld: number, factors: number, y: number): void;
  symmetricTimesVector(n: number, a: number, ld: number, x: number, y: number): void;
  productScratch(): number;
  addProduct(
    m: number,
    n: number,
    k: number,
    factor: number,
    a: number,
    aRow: number,
    aColumn: number,
    b: number,
    bRow: number,
    bColumn: number,
    c: number,
    cRow: number,
    scratch: number,
  ): void;
}

/** A piece of the kernels' memory: its byte address, and the same numbers as an array. Not cleared. */
export interface Slab {
  readonly at: number;
  readonly data: Float64Array;
}

/** The kernels with room for one computation; gone when the computation ends. */
export interface KernelWorkspace {
  readonly kernels: Kernels;
  /** Scratch for `addProduct`. */
  readonly scratch: number;
  /** The next `count` doubles of the room asked for. */
  take(count: number): Slab;
}

interface WasmMemory {
  readonly buffer: ArrayBuffer;
  grow(pages: number): number;
}

/** The part of the WebAssembly JavaScript interface that is used; neither ECMAScript's library nor this package has it. */
declare const WebAssembly: {
  Module: new (bytes: Uint8Array) => object;
  Instance: new (module: object) => { readonly exports: unknown };
};

const PAGE_BYTES = 65536;
/** 32-bit addresses. */
const MOST_PAGES = 65536;
/** An instance with more memory than this is dropped after use, since memory can't shrink. */
const KEPT_PAGES = 1024;

let compiled: object | undefined;
/** An instance that nobody uses at the moment; it carries no data from one use to the next. */
let idle: Kernels | undefined;

/** Runs `work` with a workspace of `doubles` numbers. Throws a RangeError if they do not fit in 4 GiB. */
export function withKernels<T>(doubles: number, work: (workspace: KernelWorkspace) => T): T {
  const kernels = idle ?? instantiate();
  idle = undefined;
  const scratch = PAGE_BYTES;
  const first = scratch + kernels.productScratch();
  reserve(kernels.memory, first + 8 * doubles);
  let next = first;
  const take = (count: number): Slab => {
    const slab = { at: next, data: new Float64Array(kernels.memory.buffer, next, count) };
    next += 8 * count;
    return slab;
  };
  const result = work({ kernels, scratch, take });
  if (kernels.memory.buffer.byteLength <= KEPT_PAGES * PAGE_BYTES) idle = kernels;
  return result;
}

function instantiate(): Kernels {
  compiled ??= new WebAssembly.Module(decodeBase64(KERNELS_BASE64));
  return new WebAssembly.Instance(compiled).exports as Kernels;
}

function reserve(memory: WasmMemory, bytes: number): void {
  const pages = Math.ceil(bytes / PAGE_BYTES);
  if (pages > MOST_PAGES) throw new RangeError(`Matrices of ${Math.round(bytes / 2 ** 20)} MiB do not fit in 4 GiB`);
  const missing = pages - memory.buffer.byteLength / PAGE_BYTES;
  if (missing > 0) memory.grow(missing);
}

function decodeBase64(text: string): Uint8Array {
  const digits = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/';
  const characters = text.replace(/=+$/, '');
  const bytes = new Uint8Array(Math.floor((characters.length * 3) / 4));
  let bits = 0;
  let held = 0;
  let at = 0;
  for (const character of characters) {
    held = ((held << 6) | digits.indexOf(character)) & 0xffff;
    bits += 6;
    if (bits < 8) continue;
    bits -= 8;
    bytes[at++] = (held >> bits) & 0xff;
  }
  return bytes;
}
