import { expect, it } from 'vitest';
import { DemoError } from '../../docs/examples/orchard/DemoError.js';
import { prepare } from '../../docs/examples/orchard/dataset.js';
import type { Table } from '../../docs/examples/orchard/readCsv.js';
import { stream } from '../../src/random/stream.js';

function table(names: string[], value: (row: number, column: number) => number): Table {
  return {
    names,
    places: names.map((name, k) => `column ${k + 1} (${name})`),
    numbers: Array.from({ length: 50 }, (_, i) => i + 2),
    rows: Array.from({ length: 50 }, (_, i) => Float64Array.from(names, (_, k) => value(i, k))),
  };
}

it('sets a fifth of the rows and the hidden columns apart', () => {
  const data = prepare(
    table(['u', 'v', 'secret'], (i, k) => i + 100 * k),
    'my.csv',
    stream('split'),
    ['secret'],
  );
  expect(data.bands).toEqual(['u', 'v']);
  expect([data.training.x.shape, data.heldOut.x.shape]).toEqual([
    [40, 2],
    [10, 2],
  ]);
  const first = [
    ...(data.training.x.arraySync() as number[][]),
    ...(data.heldOut.x.arraySync() as number[][]),
  ];
  expect(first.map(([u]) => u!).sort((a, b) => a - b)).toEqual(Array.from({ length: 50 }, (_, i) => i));
  for (const part of [data.training, data.heldOut]) {
    const rows = part.x.arraySync() as number[][];
    expect(part.numbers).toEqual(rows.map(([u]) => u! + 2));
    expect([...part.causes.get('secret')!]).toEqual(rows.map(([u]) => u! + 200));
  }
  const us = (data.training.x.arraySync() as number[][]).map(([u]) => u!);
  const mean = us.reduce((sum, u) => sum + u, 0) / 40;
  expect(data.center[0]).toBeCloseTo(mean, 10);
  expect(data.scale[0]).toBeCloseTo(Math.sqrt(us.reduce((sum, u) => sum + (u - mean) ** 2, 0) / 40), 10);
});

it.each([
  [
    'a column that never varies',
    table(['u', 'v', 'w'], (i, k) => (k === 1 ? 5 : i)),
    undefined,
    'my.csv: column 2 (v): must vary from row to row; got 5 throughout; leave out such columns with --ignore "v"',
  ],
  [
    'a hidden column that is not there',
    table(['u', 'v'], (i) => i),
    ['w'],
    'my.csv: --hidden must name columns of the header; it has no "w"',
  ],
  [
    'nothing to model',
    table(['u', 'v'], (i) => i),
    ['v'],
    'my.csv: must leave at least 2 columns for the model; got 1',
  ],
])('refuses %s', (_, given, hidden, message) => {
  expect(() => prepare(given, 'my.csv', stream('split'), hidden)).toThrow(new DemoError(message));
});
