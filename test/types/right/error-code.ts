import type { ErrorCode } from '../../../src/errors.js';

export const code: ErrorCode = 'shape';
