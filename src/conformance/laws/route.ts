import { parameterGradients } from '../gradients.js';
import { Violation } from '../lawError.js';
import { type Subject, streamFor } from '../subject.js';

/** A draw carries the parameters' gradient where the route is `'pathwise'`, and none where it is `'none'`. */
export function route(subject: Subject): void {
  const declared = subject.d.route;
  const gradients = parameterGradients(subject, (d) => d.draw(streamFor(subject, 'route'), 7));
  Object.keys(subject.parameters).forEach((name, k) => {
    // Some draws may not move with a parameter; that none of them does is no route.
    const carries = gradients[k]!.some((v) => v !== 0);
    if (carries === (declared === 'pathwise')) return;
    throw new Violation(
      `a draw must ${declared === 'pathwise' ? 'carry a' : 'carry no'} gradient in ${name}, for its route is '${declared}'`,
      carries ? 'one' : 'none',
      carries ? 'none' : 'one',
      'route, or what in draw breaks or makes the gradient',
    );
  });
}
