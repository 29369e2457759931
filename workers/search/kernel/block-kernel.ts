import kernelBytes from './block-fold.as.ts?kernel';

/** What the compiled kernel exports; all addresses are bytes of its memory. */
interface BlockFoldExports {
  readonly memory: WebAssembly.Memory;
  heapBase(): number;
  roomOf(bins: number, longest: number): number;
  searchBlock(
    time: number,
    weight: number,
    weighted: number,
    heads: number,
    middles: number,
    segments: number,
    profiles: number,
    stride: number,
    frequency: number,
    bins: number,
    longest: number,
    widths: number,
    widthCount: number,
    fewest: number,
    leastWeight: number,
    places: number,
    sums: number,
    running: number,
    thin: number,
    shifts: number,
    trials: number,
    found: number,
  ): void;
}

/** An instance of the kernel with its memory handed out from the bottom up. */
export interface BlockKernel extends BlockFoldExports {
  /** Room for so many bytes, aligned; all views of the memory are lost when it grows. */
  allocate(bytes: number): number;
  /** Gives back everything that was allocated after this address. */
  release(address: number): void;
}

const PAGE_BYTES = 65_536;
const ALIGNMENT = 16;

let compiled: WebAssembly.Module | undefined;

/**
 * A fresh instance with a memory of its own; the compiled code is shared by all of a thread, and warm after the first.
 * Undefined where WebAssembly or its SIMD is missing: then the plain kernel does the work.
 */
export function makeBlockKernel(): BlockKernel | undefined {
  try {
    compiled ??= new WebAssembly.Module(kernelBytes);
  } catch {
    return undefined;
  }
  const exports = new WebAssembly.Instance(compiled, {
    env: {
      abort: () => {
        throw new Error('The box search kernel ran out of its memory.');
      },
    },
  }).exports as unknown as BlockFoldExports;
  let top = align(exports.heapBase());
  return {
    ...exports,
    allocate(bytes) {
      const address = top;
      top = align(top + bytes);
      const missing = top - exports.memory.buffer.byteLength;
      if (missing > 0) exports.memory.grow(Math.ceil(missing / PAGE_BYTES));
      return address;
    },
    release: (address) => {
      top = address;
    },
  };
}

const align = (address: number): number => Math.ceil(address / ALIGNMENT) * ALIGNMENT;
