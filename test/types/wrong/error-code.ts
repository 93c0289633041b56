// expects: Type '"weather"' is not assignable to type 'ErrorCode'
import type { ErrorCode } from '../../../src/errors.js';

export const code: ErrorCode = 'weather';
