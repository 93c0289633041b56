import * as tf from '@tensorflow/tfjs';
import type { ParameterValue } from '../tensor/checks.js';
import { type Formula, kernel } from '../tensor/formula.js';
import { exponentiated } from '../tensor/transforms.js';
import type { OneOf } from './oneOf.js';
import { aboveZero, finite, logarithmic, runaway } from './parameters.js';

// What families with a location and a scale share.

/** A location, and a scale or its logarithm. */
export type LocationScaleOptions = { readonly location: ParameterValue } & OneOf<'scale' | 'logScale'>;

/** The two parameters and the ways to give them. */
export const locationScaleParameters = {
  location: { location: { domain: finite } },
  scale: {
    scale: { domain: aboveZero, fix: 'pass logScale if your network can produce negative values' },
    logScale: { domain: logarithmic, fix: runaway, transform: exponentiated },
  },
};

/** The location itself, as the mean and mode of a symmetric family. */
export const locationItself: Formula = {
  ...kernel('identity', (v) => v.clone()),
  parameters: ['location'],
};

/** location + scale · noise: the normal's map of noise to a draw, whatever the noise. */
export const affineFormula: Formula = {
  ...kernel('normalDraw', (e, l, s) => tf.add(l!, tf.mul(s!, e!))),
  parameters: ['noise', 'location', 'scale'],
};
