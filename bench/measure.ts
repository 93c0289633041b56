/** Milliseconds of each repetition. */
export type Samples = readonly number[];

/**
 * Processor time that this process has used, in milliseconds, over all its threads. Unlike the clock on the
 * wall it does not run on while the machine does somebody else's work.
 */
export function processorTime(): number {
  const { user, system } = process.cpuUsage();
  return (user + system) / 1000;
}

/** How often to repeat: `batch` calls make one sample, so that short work is longer than the clock's grain of a microsecond. */
export interface Repetition {
  readonly rounds: number;
  readonly warmUp?: number;
  readonly batch?: number;
}

/**
 * Times several pieces of work in turn, A B A B …, so that whatever else the machine does meets all of them
 * alike. Every second round runs in reverse order, so that none is always the one after a costly neighbor.
 */
export function interleave(
  works: readonly (() => void)[],
  { rounds, warmUp = 3, batch = 1 }: Repetition,
): Samples[] {
  const samples: number[][] = works.map(() => []);
  const order = works.map((_, k) => k);
  for (let round = -warmUp; round < rounds; round++) {
    for (const k of order) {
      const start = processorTime();
      for (let i = 0; i < batch; i++) works[k]!();
      const elapsed = (processorTime() - start) / batch;
      if (round >= 0) samples[k]!.push(elapsed);
    }
    order.reverse();
  }
  return samples;
}

/** The value below which a share `p` of the samples lies, by linear interpolation. */
export function quantile(samples: Samples, p: number): number {
  const sorted = [...samples].sort((a, b) => a - b);
  const at = p * (sorted.length - 1);
  const below = Math.floor(at);
  const rest = at - below;
  return sorted[below]! * (1 - rest) + sorted[Math.min(below + 1, sorted.length - 1)]! * rest;
}

/** The middle sample. */
export function median(samples: Samples): number {
  return quantile(samples, 0.5);
}

/** One measured thing beside what it is compared with. */
export interface Comparison {
  /** Medians and minima in milliseconds. */
  readonly own: { readonly median: number; readonly least: number };
  readonly peer: { readonly median: number; readonly least: number };
  /** Median over median. */
  readonly ratio: number;
  /** Quartiles of the ratios round by round. */
  readonly quartiles: readonly [number, number];
  /** Least over least: what remains when nothing else disturbs. */
  readonly leastRatio: number;
  readonly rounds: number;
}

/** Compares samples that were taken in the same rounds; `scale` multiplies the peer's. */
export function compare(own: Samples, peer: Samples, scale = 1): Comparison {
  const scaled = peer.map((ms) => scale * ms);
  const summary = (samples: Samples) => ({ median: median(samples), least: Math.min(...samples) });
  const [a, b] = [summary(own), summary(scaled)];
  const ratios = own.map((ms, i) => ms / scaled[i]!);
  return {
    own: a,
    peer: b,
    ratio: a.median / b.median,
    quartiles: [quantile(ratios, 0.25), quantile(ratios, 0.75)],
    leastRatio: a.least / b.least,
    rounds: own.length,
  };
}

/** Compares samples of two processes that ran one after the other: the quartiles are over the peer's median. */
export function compareApart(own: Samples, peer: Samples): Comparison {
  const middle = median(peer);
  return {
    own: { median: median(own), least: Math.min(...own) },
    peer: { median: middle, least: Math.min(...peer) },
    ratio: median(own) / middle,
    quartiles: [quantile(own, 0.25) / middle, quantile(own, 0.75) / middle],
    leastRatio: Math.min(...own) / Math.min(...peer),
    rounds: own.length,
  };
}
