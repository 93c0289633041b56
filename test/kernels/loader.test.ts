import { afterEach, expect, test, vi } from 'vitest';

const original = globalThis.WebAssembly;

afterEach(() => {
  globalThis.WebAssembly = original;
  vi.resetModules();
});

async function firstUse() {
  vi.resetModules();
  const { kernelModule } = await import('../../src/kernels/loader.js');
  return kernelModule;
}

test('the module loads on first use, without a download, once', async () => {
  const kernelModule = await firstUse();
  expect(kernelModule()).toBe(kernelModule());
});

test('a page whose content policy forbids WebAssembly gets one clear error', async () => {
  const kernelModule = await firstUse();
  // What engines do under a policy without 'wasm-unsafe-eval': the constructor throws a CompileError.
  globalThis.WebAssembly = {
    ...original,
    Module: class {
      constructor() {
        throw new original.CompileError(
          "Refused to compile or instantiate WebAssembly module because 'unsafe-eval' is not an allowed source of script",
        );
      }
    },
    Instance: original.Instance,
  } as unknown as typeof WebAssembly;
  expect(() => kernelModule()).toThrow(
    expect.objectContaining({
      name: 'EnvironmentError',
      code: 'environment',
      message:
        "kernels: the page must allow WebAssembly; got a refusal to compile; add 'wasm-unsafe-eval' to the script-src of its content security policy",
    }),
  );
});

test('an engine without WebAssembly gets one clear error', async () => {
  const kernelModule = await firstUse();
  globalThis.WebAssembly = undefined as unknown as typeof WebAssembly;
  expect(() => kernelModule()).toThrow(
    'kernels: the engine must provide WebAssembly; got none; use a current browser or Node 20 or later',
  );
});

test('the scratch memory grows on demand and keeps what was reserved apart', async () => {
  const module = (await firstUse())();
  module.begin();
  const sizes = [1, 1000, 3_000_000, 7, 9_000_000];
  const pointers = sizes.map((bytes) => module.reserve(bytes));
  pointers.forEach((pointer, i) => {
    expect(pointer % 16).toBe(0);
    if (i > 0) expect(pointer).toBeGreaterThanOrEqual(pointers[i - 1]! + sizes[i - 1]!);
  });
  expect(module.floats.byteLength).toBeGreaterThan(12_000_000);
});
