import { LeadlineError } from '../../errors.js';
import { stream } from '../../random/stream.js';
import { Violation } from '../lawError.js';
import type { Factory } from '../subject.js';

/** Each of the options is refused with a `LeadlineError`. */
export function invalidParameters(factory: Factory, invalid: readonly object[]): void {
  for (const options of invalid) {
    const fault = (got: string): Violation =>
      new Violation(
        'invalid parameters must throw a LeadlineError',
        got,
        `an error for ${text(options)}`,
        "the factory's checks",
      );
    try {
      factory(options).draw(stream(1)).dispose();
    } catch (error) {
      if (error instanceof LeadlineError) continue;
      throw fault(error instanceof Error ? `${error.name}: ${error.message}` : String(error));
    }
    throw fault('a distribution');
  }
}

function text(options: object): string {
  // JSON has no NaN and no infinities, which are just what matters here.
  return JSON.stringify(options, (_key, v) => (typeof v === 'number' && !Number.isFinite(v) ? String(v) : v));
}
