import * as vega from 'vega';

/** What the plotting library asks for the width of a text; its own guess without a canvas is far too wide. */
const { textMetrics } = vega as unknown as {
  textMetrics: { width: (item: { fontSize?: number }, text?: unknown) => number };
};

/** Widths in units of the font size, of a wide sans-serif face, so that a narrower one fits, too. */
const classes: readonly (readonly [RegExp, number])[] = [
  [/[ijl|.,:;' ]/, 0.32],
  [/[frt()[\]/-]/, 0.4],
  [/[mwMW%]/, 0.92],
  [/[A-Z]/, 0.7],
];

/** How wide a text is, about. */
export function textWidth(text: string, fontSize: number): number {
  const units = Array.from(text, (letter) => classes.find(([set]) => set.test(letter))?.[1] ?? 0.63);
  return fontSize * units.reduce((sum, width) => sum + width, 0);
}

/** Lets the plotting library measure texts by {@link textWidth}. */
export function measureTexts(): void {
  textMetrics.width = (item, text) => textWidth(String(text ?? ''), item.fontSize ?? 11);
}
