import { kernel } from '../../tensor/formula.js';
import { noComposedForm } from '../../tensor/noComposedForm.js';
import { addScalarKl } from '../addScalarKl.js';

/**
 * 2 λ A(κ) sin²(Δ/2) + log I₀(λ) − log I₀(κ) − A(κ) (λ − κ) for concentrations κ, λ and locations Δ apart, from the
 * mean direction's length A = I₁ / I₀ (Mardia and Jupp, Directional Statistics, 2000, section 3.5.4).
 */
export function registerVonMisesKl(): void {
  addScalarKl('vonMises|vonMises', kernel('vonMisesKl', noComposedForm('vonMisesKl')));
}
