import type { TopLevelSpec } from 'vega-lite';
import type { CurvePoint } from '../fitModel.js';

const training = 'trained on';
const heldOut = 'held out';

/** The bound against the steps, for rows trained on and rows held out. */
export function learningCurve(curve: readonly CurvePoint[], noun: string, nouns: string): TopLevelSpec {
  const values = curve.flatMap((point) => [
    { step: point.step, bound: point.training, rows: `${nouns} ${training}` },
    { step: point.step, bound: point.heldOut, rows: `${nouns} ${heldOut}` },
  ]);
  // The first steps lie far below; what one wants to see is where the two part.
  const late = curve.filter((_, i) => i >= curve.length / 12).flatMap((p) => [p.training, p.heldOut]);
  const [low, high] = [Math.min(...late), Math.max(...late)];
  const margin = 0.05 * (high - low) || 1;
  return {
    title: {
      text: 'Learning curve',
      subtitle: `Each point of the training curve is the mean over the batches since the point before.`,
    },
    width: 620,
    height: 380,
    data: { values },
    mark: { type: 'line', clip: true, strokeWidth: 2.5, point: { size: 28, filled: true } },
    encoding: {
      x: { field: 'step', type: 'quantitative', title: 'training step', axis: { tickCount: 7 } },
      y: {
        field: 'bound',
        type: 'quantitative',
        title: `bound on the log evidence (nats per ${noun})`,
        scale: { domain: [low - margin, high + margin], zero: false, nice: false },
      },
      color: {
        field: 'rows',
        type: 'nominal',
        title: null,
        scale: { domain: [`${nouns} ${training}`, `${nouns} ${heldOut}`], range: ['#8a8a8a', '#0b6aa2'] },
        legend: {
          orient: 'bottom-right',
          fillColor: 'white',
          padding: 8,
          strokeColor: '#ccc',
          symbolSize: 80,
        },
      },
    },
  };
}
