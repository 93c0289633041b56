import { expect, it } from 'vitest';
import { type AccuracyRow, committedRows, familyRows, keyOf, numericRows } from './table.js';

// Math.exp and its like differ between engines in the last bit of a double, which is 1e-8 float32 units.
const engines = 1e-4;

const committed = committedRows();
const rows = [...(await numericRows()), ...familyRows()];

it('the committed table has the rows of today, and as many points', () => {
  const today = new Map(rows.map((row) => [keyOf(row), row.points]));
  expect(today.size).toBe(rows.length);
  expect(new Map([...committed].map(([key, row]) => [key, row.points]))).toEqual(today);
});

it('no row is worse than the committed one', () => {
  const worse = (row: AccuracyRow): string[] => {
    const before = committed.get(keyOf(row));
    if (!before || (row.worst <= before.worst + engines && row.mean <= before.mean + engines)) return [];
    return [
      `${keyOf(row)}: worst ${row.worst} at ${row.at}, mean ${row.mean}; before ${before.worst}, ${before.mean}`,
    ];
  };
  expect(rows.flatMap(worse)).toEqual([]);
});

it('the ratchet sees a worse row', () => {
  const [key, row] = [...committed][0]!;
  expect(committed.get(key)!.worst).toBeGreaterThan(0);
  expect(row.worst + 0.01 <= committed.get(key)!.worst + engines).toBe(false);
});
