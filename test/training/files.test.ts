import * as tf from '@tensorflow/tfjs';
import { expect, it, vi } from 'vitest';
import { refusal } from './toy.js';

vi.mock('node:fs/promises', () => {
  throw new Error('this is a page');
});

it('a platform without files gets a pointer to the functions of bytes', async () => {
  const { checkpoint, resume } = await import('../../src/training/checkpoint.js');
  const { decodeCheckpoint, encodeCheckpoint } = await import('../../src/training/checkpointBytes.js');
  const variables = { a: tf.variable(tf.scalar(3)) };
  const rest =
    'the platform must have files; got none; use encodeCheckpoint and decodeCheckpoint, and store the bytes yourself';
  expect(await refusal(() => checkpoint('a', { variables }))).toBe(`EnvironmentError: checkpoint: ${rest}`);
  expect(await refusal(() => resume('a', { variables }))).toBe(`EnvironmentError: resume: ${rest}`);
  const bytes = await encodeCheckpoint({ variables });
  tf.tidy(() => variables.a.assign(tf.scalar(0)));
  await decodeCheckpoint(bytes, { variables });
  expect(variables.a.arraySync()).toBe(3);
});
