import { ParameterError } from '../errors.js';
import { describe } from '../tensor/checks.js';

/** A value that JSON keeps as it is. */
export type Json = null | boolean | number | string | readonly Json[] | { readonly [key: string]: Json };

/** Refuses what `JSON.stringify` would silently drop or turn into null. */
export function requireJson(where: string, name: string, value: unknown): asserts value is Json {
  if (value === null || typeof value === 'string' || typeof value === 'boolean') return;
  if (typeof value === 'number' && Number.isFinite(value)) return;
  if (Array.isArray(value)) {
    for (const [i, item] of value.entries()) requireJson(where, `${name}[${i}]`, item);
    return;
  }
  if (typeof value === 'object') {
    const prototype = Object.getPrototypeOf(value);
    if (prototype === Object.prototype || prototype === null) {
      for (const [key, item] of Object.entries(value)) requireJson(where, `${name}.${key}`, item);
      return;
    }
  }
  throw new ParameterError(
    `${where}: ${name} must be a JSON value; got ${describe(value)}; keep finite numbers, strings, booleans, null, arrays and plain objects of them`,
  );
}
