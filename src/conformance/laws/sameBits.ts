import type * as tf from '@tensorflow/tfjs';
import { stream } from '../../random/stream.js';
import { requireClose, Violation } from '../lawError.js';
import { numbers, type Subject, streamFor } from '../subject.js';

/** The same stream gives the same bits, another stream others, and a scored draw is the draw with its score. */
export function sameBits(subject: Subject): void {
  const { d } = subject;
  const count = 40;
  const own = () => streamFor(subject, 'bits');
  const first = numbers(() => d.draw(own(), count));
  requireSame(
    first,
    numbers(() => d.draw(own(), count)),
    'two draws from one stream must have the same bits',
  );
  const state = own();
  d.draw(state, count).dispose();
  const continued = numbers(() => d.draw(state, count));
  const spread = new Set(first).size > 1;
  if (!d.support.discrete && (!spread || same(first, continued)))
    throw new Violation(
      'draws must use the stream, and advance it',
      spread ? 'the same numbers again' : `${count} draws of ${first[0]}`,
      'other numbers',
      'draw: that all its noise comes from the stream',
    );
  if (
    !d.support.discrete &&
    same(
      first,
      numbers(() => d.draw(stream(subject.setting.seed + 1), count)),
    )
  )
    throw new Violation(
      'another stream must give other draws',
      'the same numbers',
      'other numbers',
      'draw: that all its noise comes from the stream',
    );
  const scored: { value: tf.Tensor; logDensity: tf.Tensor } = d.drawScored(own(), count);
  const [value, score] = [scored.value, scored.logDensity].map((t) => Float64Array.from(t.dataSync()));
  const expected = numbers(() => d.logDensity(scored.value));
  scored.value.dispose();
  scored.logDensity.dispose();
  requireSame(first, value!, 'drawScored must draw what draw draws');
  score!.forEach((v, i) => {
    // Two float32 computations of one number.
    requireClose(
      v,
      expected[i]!,
      1e-5 * Math.max(1, Math.abs(expected[i]!)),
      `the log density that drawScored gives for ${value![i]} must be that of logDensity`,
      'drawScored',
    );
  });
}

function same(a: Float64Array, b: Float64Array): boolean {
  return a.length === b.length && a.every((v, i) => Object.is(v, b[i]));
}

function requireSame(a: Float64Array, b: Float64Array, must: string): void {
  if (same(a, b)) return;
  const k = a.findIndex((v, i) => !Object.is(v, b[i]));
  throw new Violation(
    must,
    `${b[k]} at draw ${k}`,
    a[k]!,
    'draw: state kept between calls, or a source other than the stream',
  );
}
