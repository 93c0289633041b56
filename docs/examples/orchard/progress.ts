import { Presets, SingleBar } from 'cli-progress';
import type { Watched } from './fitModel.js';

/** Shows how far training is. */
export interface ProgressDisplay {
  show(moment: Watched): void;
  stop(): void;
}

/** A moving bar on a terminal; elsewhere, such as in a log, about five plain lines. */
export function progressDisplay(out: NodeJS.WriteStream, steps: number, noun: string): ProgressDisplay {
  return out.isTTY ? bar(out, steps) : lines(out, steps, noun);
}

function bar(out: NodeJS.WriteStream, steps: number): ProgressDisplay {
  const single = new SingleBar(
    {
      stream: out,
      format: 'Training {bar} {value}/{total} | held-out {heldOut} nats | {left} left',
      barsize: 24,
      hideCursor: true,
      // It would only stop the bar on Ctrl-C, and let the program go on.
      gracefulExit: false,
    },
    Presets.shades_classic,
  );
  const stop = () => single.stop();
  const interrupted = () => {
    stop();
    process.exit(130);
  };
  process.once('SIGINT', interrupted);
  let heldOut = '…';
  single.start(steps, 0, { heldOut, left: '…' });
  return {
    show({ step, timeLeft, point }) {
      if (point) heldOut = point.heldOut.toFixed(2);
      single.update(step, { heldOut, left: `${Math.ceil(timeLeft)} s` });
    },
    stop() {
      stop();
      process.removeListener('SIGINT', interrupted);
    },
  };
}

function lines(out: NodeJS.WriteStream, steps: number, noun: string): ProgressDisplay {
  let next = steps / 5;
  return {
    show({ step, point }) {
      if (!point || step < next) return;
      while (next <= step) next += steps / 5;
      out.write(`step ${step} of ${steps}: held-out bound ${point.heldOut.toFixed(2)} nats per ${noun}\n`);
    },
    stop() {},
  };
}
