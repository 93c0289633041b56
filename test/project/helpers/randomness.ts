import ts from 'typescript';
import { lineOf, parse, visitAll } from './imports.js';

/** Members of the tensor library that draw from its own random state. */
const randomMembers = /^(rand|random\w*|truncatedNormal|multinomial|dropout)$/;

/** Every use of a random source other than a stream in one source file. */
export function randomnessFaults(path: string, text: string): string[] {
  const file = parse(path, text);
  const faults: string[] = [];
  visitAll(file, (node) => {
    if (!ts.isPropertyAccessExpression(node)) return;
    const object = node.expression.getText(file);
    const member = node.name.text;
    const ambient =
      (object === 'Math' && member === 'random') ||
      (object === 'tf' && randomMembers.test(member)) ||
      /^(getRandomValues|randomUUID)$/.test(member);
    if (ambient) faults.push(`${path}:${lineOf(node, file)}: ${object}.${member} draws outside a stream`);
  });
  return faults;
}
