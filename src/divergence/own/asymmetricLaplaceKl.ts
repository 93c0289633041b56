import { kernel } from '../../tensor/formula.js';
import { noComposedForm } from '../../tensor/noComposedForm.js';
import { addScalarKl } from '../addScalarKl.js';

/** Registers the divergence of two asymmetric Laplace distributions, by direct integration. */
export function registerAsymmetricLaplaceKl(): void {
  addScalarKl(
    'asymmetricLaplace|asymmetricLaplace',
    kernel('asymmetricLaplaceKl', noComposedForm('asymmetricLaplaceKl')),
  );
}
