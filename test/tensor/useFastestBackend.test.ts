import { execFileSync } from 'node:child_process';
import * as tf from '@tensorflow/tfjs';
import { expect, test } from 'vitest';
import { EnvironmentError, ParameterError, useFastestBackend } from '../../src/index.js';

test('takes wasm where it is installed, and cpu where it cannot be loaded', async () => {
  expect(await useFastestBackend()).toBe('wasm');
  expect(tf.getBackend()).toBe('wasm');
  expect(await useFastestBackend({ loadWasm: () => Promise.reject(new Error('not installed')) })).toBe('cpu');
  expect(tf.getBackend()).toBe('cpu');
});

test('wrong options have one clear message each', async () => {
  await expect(useFastestBackend({ wasm: true } as never)).rejects.toThrow(
    new ParameterError("useFastestBackend: options must be among loadWasm; got 'wasm'; remove or rename it"),
  );
  await expect(useFastestBackend({ loadWasm: 3 as never })).rejects.toThrow(
    new ParameterError(
      "useFastestBackend: loadWasm must be a function; got 3; pass () => import('@tensorflow/tfjs-backend-wasm')",
    ),
  );
  expect(new EnvironmentError('x').code).toBe('environment');
});

test('an error that nobody catches afterwards prints its own message, not the loader’s source', () => {
  const program = `
    import { useFastestBackend } from './src/index.ts';
    await useFastestBackend();
    throw new Error('the user made a mistake');
  `;
  let printed = '';
  try {
    execFileSync(process.execPath, ['--import', 'tsx', '--input-type=module', '-e', program], {
      encoding: 'utf8',
      stdio: 'pipe',
    });
  } catch (error) {
    printed = (error as { stderr: string }).stderr;
  }
  expect(printed).toContain('the user made a mistake');
  expect(printed.length).toBeLessThan(2000);
});
