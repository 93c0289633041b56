import { exponentiated } from '../tensor/transforms.js';
import type { OneOf } from './oneOf.js';
import { aboveZero, logarithmic, runaway } from './parameters.js';

// The parameters of families with a scale, and perhaps a shape, and no location.

/** A scale or its logarithm. */
export type ScaleOptions = OneOf<'scale' | 'logScale'>;

/** A scale and a shape, or the logarithm of either. */
export type ScaleAndShapeOptions = ScaleOptions & OneOf<'shape' | 'logShape'>;

/** The ways to give a scale. */
export const scaleForms = {
  scale: { domain: aboveZero, fix: 'pass logScale if your network can produce negative values' },
  logScale: { domain: logarithmic, fix: runaway, transform: exponentiated },
};

/** The ways to give a shape. */
export const shapeForms = {
  shape: { domain: aboveZero, fix: 'pass logShape if your network can produce negative values' },
  logShape: { domain: logarithmic, fix: runaway, transform: exponentiated },
};

/** The ways to give a rate. */
export const rateForms = {
  rate: { domain: aboveZero, fix: 'pass logRate if your network can produce negative values' },
  logRate: { domain: logarithmic, fix: runaway, transform: exponentiated },
};
