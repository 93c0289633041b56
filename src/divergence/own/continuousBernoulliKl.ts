import { kernel } from '../../tensor/formula.js';
import { noComposedForm } from '../../tensor/noComposedForm.js';
import { addScalarKl } from '../addScalarKl.js';

/** Registers the divergence of two continuous Bernoulli distributions: the Bregman divergence of their normalizer. */
export function registerContinuousBernoulliKl(): void {
  addScalarKl(
    'continuousBernoulli|continuousBernoulli',
    kernel('continuousBernoulliKl', noComposedForm('continuousBernoulliKl')),
  );
}
