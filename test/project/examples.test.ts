import { expect, it } from 'vitest';
import { checkExamples } from './helpers/checkExamples.js';
import { findExamples } from './helpers/findExamples.js';
import { filesBelow, read, sourceFiles } from './helpers/repository.js';

const documents = [
  'README.md',
  ...filesBelow('docs', /\.md$/).filter((path) => !path.startsWith('docs/api/')),
];
const examples = [...documents, ...sourceFiles()].flatMap((path) => findExamples(path, read(path)));

it('the documentation holds examples', () => {
  expect(examples.some((example) => example.path === 'README.md')).toBe(true);
  expect(examples.some((example) => example.path.startsWith('src/'))).toBe(true);
});

for (const { title, check } of checkExamples(examples, 'documentation')) {
  it(title, async () => {
    expect((await check()).join('\n\n')).toBe('');
  });
}
