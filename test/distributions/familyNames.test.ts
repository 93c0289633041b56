import * as tf from '@tensorflow/tfjs';
import { expect, test } from 'vitest';
import { familyNames } from '../../src/distributions/familyNames.js';
import * as leadline from '../../src/index.js';
import { filesBelow, read } from '../project/helpers/repository.js';

test('the reserved names are those of the families that the sources define', () => {
  const defined = filesBelow('src/distributions', /\.ts$/).flatMap((path) => {
    const name = /^ {2,4}family: '(\w+)'/m.exec(read(path))?.[1];
    return name ? [name] : [];
  });
  expect([...familyNames].sort()).toEqual(defined.sort());
  for (const name of familyNames) expect(Object.keys(leadline)).toContain(name);
});

test('a family of one’s own may not take one of them', () => {
  const formula = { value: () => 0, partials: [() => 0, () => 0] };
  expect(() =>
    leadline.quantileFamily({
      family: 'laplace',
      parameters: { a: 'real' },
      logDensity: formula,
      quantile: formula,
    }),
  ).toThrow(
    new leadline.ParameterError(
      "quantileFamily: family must have a name of its own; got 'laplace', which the library has; choose another",
    ),
  );
});

test('a parameter that was disposed of is named as that, not as an error of the engine', () => {
  const mean = tf.tensor1d([1, 2]);
  const d = leadline.normal({ mean, sd: 1 });
  mean.dispose();
  const message =
    "a distribution's parameters must be alive when it is used; got a disposed tensor of shape [2]; keep it with tf.keep(…), or make and use the distribution inside the same tf.tidy";
  expect(() => d.logDensity(tf.scalar(0))).toThrow(new leadline.ParameterError(message));
  expect(() => d.mean()).toThrow(new leadline.ParameterError(message));
  expect(() => leadline.composed(() => d.entropy())).not.toThrow();
  expect(() => leadline.composed(() => d.logDensity(tf.scalar(0)))).toThrow(message);
});
