import type { TopLevelSpec } from 'vega-lite';
import type { Reconstructed } from '../reconstruct.js';
import type { BandAxis } from './bandAxis.js';

/** Several held-out rows as measured, as the model would have them, and the band that it allows for. */
export function reconstructions(
  rows: readonly { readonly title: string; readonly bands: readonly Reconstructed[] }[],
  axis: BandAxis,
  valueTitle: string,
  nouns: string,
): TopLevelSpec {
  const values = rows.flatMap(({ title, bands }) =>
    bands.map((band, k) => ({ row: title, at: axis.positions[k]!, ...band })),
  );
  const legend = ['measured', 'reconstructed', '95 % band'];
  const color = (name: string) => ({
    datum: name,
    type: 'nominal',
    title: null,
    scale: { domain: legend, range: ['#222222', '#d1495b', '#eba9b1'] },
    legend: { orient: 'top', symbolSize: 120, symbolType: 'circle', symbolOpacity: 1 },
  });
  const y = (field: string) => ({ field, type: 'quantitative', title: valueTitle, scale: { zero: false } });
  return {
    title: {
      text: 'Reconstructions',
      subtitle: `Some of the ${nouns} held out. The band allows for noise and for what the recognizer leaves open.`,
    },
    data: { values },
    facet: { field: 'row', type: 'nominal', title: null, sort: rows.map(({ title }) => title) },
    columns: 2,
    spacing: 24,
    spec: {
      width: 310,
      height: 170,
      encoding: {
        x: {
          field: 'at',
          type: 'quantitative',
          title: axis.title,
          axis: { format: '~r', tickCount: 6 },
          scale: { zero: false, nice: false },
        },
      },
      layer: [
        {
          mark: { type: 'area', opacity: 1 },
          encoding: { y: y('low'), y2: { field: 'high' }, color: color('95 % band') },
        },
        { mark: { type: 'line', strokeWidth: 2 }, encoding: { y: y('mean'), color: color('reconstructed') } },
        {
          mark: { type: 'circle', size: 16, opacity: 1 },
          encoding: { y: y('measured'), color: color('measured') },
        },
      ],
    },
  } as TopLevelSpec;
}
