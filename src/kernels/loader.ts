import { EnvironmentError } from '../errors.js';
import { moduleBytes } from './generated/moduleBytes.js';

/** The functions that the compiled module exports, by name. */
type Exports = Record<string, (...values: number[]) => number> & { memory: WebAssembly.Memory };

const pageBytes = 65536;

function decode(base64: string): Uint8Array<ArrayBuffer> {
  const text = atob(base64);
  const bytes = new Uint8Array(text.length);
  for (let i = 0; i < text.length; i++) bytes[i] = text.charCodeAt(i);
  return bytes;
}

/**
 * The compiled module with a scratch memory that is laid out anew for each call: `begin()` empties it,
 * `reserve(bytes)` hands out the next 16-byte aligned piece. Views of the memory are made after the last
 * `reserve`, since growing it detaches older ones.
 */
export class KernelModule {
  readonly call: Exports;
  #floats: Float32Array;
  #words: Int32Array;
  readonly #base: number;
  #next: number;
  #layout = 0;

  constructor(exports: Exports) {
    this.call = exports;
    this.#base = (exports.heapBase!() + 15) & ~15;
    this.#next = this.#base;
    this.#floats = new Float32Array(exports.memory.buffer);
    this.#words = new Int32Array(exports.memory.buffer);
  }

  begin(): void {
    this.#next = this.#base;
    this.#layout++;
  }

  /** Counts the calls of `begin`: what was reserved under another number is gone. */
  get layout(): number {
    return this.#layout;
  }

  /** Where the next piece starts. */
  get end(): number {
    return this.#next;
  }

  /** Gives back everything that was reserved from `end` on. */
  rewind(end: number): void {
    this.#next = end;
  }

  reserve(bytes: number): number {
    const at = this.#next;
    this.#next = (at + bytes + 15) & ~15;
    const memory = this.call.memory;
    const missing = this.#next - memory.buffer.byteLength;
    if (missing > 0) {
      // Grow by half at least, so that ever larger calls do not grow the memory each time.
      const pages = Math.ceil(Math.max(missing, memory.buffer.byteLength / 2) / pageBytes);
      try {
        memory.grow(pages);
      } catch (cause) {
        throw new EnvironmentError(
          `kernels: scratch memory must hold ${this.#next} bytes; got a refusal from the engine; evaluate fewer elements at once`,
          { cause },
        );
      }
    }
    return at;
  }

  /** The whole memory as float32 numbers; index with `pointer >> 2`. */
  get floats(): Float32Array {
    if (this.#floats.buffer !== this.call.memory.buffer)
      this.#floats = new Float32Array(this.call.memory.buffer);
    return this.#floats;
  }

  /** The whole memory as 32-bit integers; index with `pointer >> 2`. */
  get words(): Int32Array {
    if (this.#words.buffer !== this.call.memory.buffer) this.#words = new Int32Array(this.call.memory.buffer);
    return this.#words;
  }
}

let loaded: KernelModule | undefined;

/** The compiled module, instantiated on first use from bytes that the package carries. */
export function kernelModule(): KernelModule {
  loaded ??= load();
  return loaded;
}

function load(): KernelModule {
  if (typeof WebAssembly === 'undefined') {
    throw new EnvironmentError(
      'kernels: the engine must provide WebAssembly; got none; use a current browser or Node 20 or later',
    );
  }
  try {
    const instance = new WebAssembly.Instance(new WebAssembly.Module(decode(moduleBytes)), {});
    return new KernelModule(instance.exports as Exports);
  } catch (cause) {
    throw new EnvironmentError(
      "kernels: the page must allow WebAssembly; got a refusal to compile; add 'wasm-unsafe-eval' to the script-src of its content security policy",
      { cause },
    );
  }
}
