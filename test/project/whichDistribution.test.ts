import { expect, it } from 'vitest';
import { factoriesOf } from '../conformance/factories.js';
import { catalogueTable, committedPage, pageWithTable } from './catalogueTable.js';

it('the table of the page is that of the library', () => {
  const page = committedPage();
  expect(pageWithTable(page)).toBe(page);
});

it('every exported family has a row, and is spoken of in the text', () => {
  const table = catalogueTable();
  const text = committedPage().replace(table, '');
  for (const family of factoriesOf('src/index.ts')) {
    expect(table).toContain(`| \`${family}\` |`);
    expect(text).toContain(`\`${family}\``);
  }
});
