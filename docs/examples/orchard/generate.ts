import * as tf from '@tensorflow/tfjs';
import type { Stream } from 'leadline';
import { absorbance, type Causes, sensorNoise, wavelengths } from './spectrum.js';

/** The columns that say what a fruit is like, for comparison; no packing line would have them. */
export const causeNames = ['ripeness', 'water', 'bruise', 'depth'] as const;

/** Invents a season's quorrels, as the text of a CSV file. */
export function generate(stream: Stream, fruits: number): string {
  const normals = (label: string, shape: number[] = [fruits]) =>
    tf.tidy(() => stream.fork(label).normal(shape).dataSync());
  const ripeness = normals('ripeness');
  const water = normals('water');
  const depth = normals('depth');
  const hit = tf.tidy(() => stream.fork('hit').uniform([fruits]).dataSync());
  const severity = tf.tidy(() => stream.fork('severity').exponential([fruits]).dataSync());
  const noise = normals('noise', [fruits, wavelengths.length]);

  const lines = [[...causeNames, ...wavelengths.map((at) => `${at} nm`)].join(',')];
  for (let i = 0; i < fruits; i++) {
    const causes: Causes = {
      ripeness: 1 / (1 + Math.exp(-1.3 * ripeness[i]!)),
      water: 84 + 2.5 * water[i]!,
      bruise: hit[i]! < 0.3 ? Math.min(1, 0.1 + 0.3 * severity[i]!) : 0,
      depth: 8 * Math.exp(0.12 * depth[i]!),
    };
    const spectrum = wavelengths.map(
      (at, k) => absorbance(at, causes) + sensorNoise(at) * noise[i * wavelengths.length + k]!,
    );
    const known = causeNames.map((name) => causes[name].toFixed(3));
    lines.push([...known, ...spectrum.map((value) => value.toFixed(4))].join(','));
  }
  return `${lines.join('\n')}\n`;
}
