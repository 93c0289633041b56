import * as tf from '@tensorflow/tfjs';
import { parameterGradients } from '../gradients.js';
import { Violation } from '../lawError.js';
import { type Member, numbers, type Subject, streamFor } from '../subject.js';

/** `detached()` cuts the gradient of everything, and changes no number. */
export function detached(subject: Subject): void {
  const uses: Record<string, (d: Member) => tf.Tensor> = {
    draw: (d) => d.draw(streamFor(subject, 'detached'), 5),
    logDensity: (d) => d.logDensity(subject.d.draw(streamFor(subject, 'detached'), 5)),
    'the log density of drawScored': (d) => d.drawScored(streamFor(subject, 'detached'), 5).logDensity,
  };
  for (const name of ['mean', 'variance', 'mode', 'entropy'] as const) {
    if (subject.d[name]) uses[name] = (d) => d[name]!();
  }
  if (subject.d.cdf) uses.cdf = (d) => d.cdf!(subject.d.draw(streamFor(subject, 'detached'), 5));
  if (subject.d.quantile) uses.quantile = (d) => d.quantile!(tf.tensor1d([0.2, 0.7]));
  for (const [name, use] of Object.entries(uses)) {
    parameterGradients(subject, (d) => use(d.detached())).forEach((gradient, k) => {
      const parameter = Object.keys(subject.parameters)[k];
      const through = gradient.find((v) => v !== 0);
      if (through === undefined) return;
      throw new Violation(
        `detached() must cut the gradient of ${name} in ${parameter}`,
        through,
        0,
        'detached: it must make the same member from detach(parameter)',
      );
    });
    const [kept, cut] = [numbers(() => use(subject.d)), numbers(() => use(subject.d.detached()))];
    const k = kept.findIndex((v, i) => !Object.is(v, cut[i]));
    if (k >= 0)
      throw new Violation(
        `detached() must leave the numbers of ${name}`,
        cut[k]!,
        kept[k]!,
        'detached: it must make the same member from detach(parameter)',
      );
  }
}
