import { parse, View, Warn } from 'vega';
import { compile, type TopLevelSpec } from 'vega-lite';
import { measureTexts } from './textWidth.js';

/** Collects what the plotting library has to say instead of printing it. */
function collector(messages: string[]) {
  const keep = (...parts: readonly unknown[]) => {
    messages.push(parts.map(String).join(' '));
    return logger;
  };
  const silent = () => logger;
  const logger = { level: () => Warn, error: keep, warn: keep, info: silent, debug: silent };
  return logger as never;
}

const look = {
  font: 'Helvetica, Arial, sans-serif',
  background: 'white',
  padding: 16,
  title: {
    fontSize: 17,
    anchor: 'start',
    offset: 12,
    subtitleFontSize: 13,
    subtitleColor: '#444',
    subtitlePadding: 6,
  },
  axis: {
    labelFontSize: 13,
    titleFontSize: 14,
    titleFontWeight: 'normal',
    gridColor: '#e6e6e6',
    labelFlush: false,
    titlePadding: 10,
  },
  legend: {
    labelFontSize: 13,
    titleFontSize: 14,
    titleFontWeight: 'normal',
    labelLimit: 400,
    titleLimit: 400,
  },
  header: { labelFontSize: 14, titleFontSize: 14 },
  view: { stroke: '#bbb' },
} as const;

/** A picture as SVG text, and any complaint that the plotting library made about it. */
export async function renderSvg(spec: TopLevelSpec): Promise<{ svg: string; complaints: string[] }> {
  measureTexts();
  const complaints: string[] = [];
  const logger = collector(complaints);
  const { spec: drawn } = compile({ ...spec, config: look } as TopLevelSpec, { logger });
  const view = new View(parse(drawn), { renderer: 'none', logger });
  const svg = await view.toSVG();
  view.finalize();
  return { svg: `${svg}\n`, complaints };
}
