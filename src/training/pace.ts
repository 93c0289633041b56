/** Measures how fast steps follow each other, over the last 100 of them. */
export class Pace {
  readonly #times: number[];

  constructor(readonly now: () => number = () => performance.now()) {
    this.#times = [now()];
  }

  /** Notes the end of a step. */
  tick(): void {
    this.#times.push(this.now());
    if (this.#times.length > 101) this.#times.shift();
  }

  /** Steps per second; 0 before the first one. */
  get rate(): number {
    const steps = this.#times.length - 1;
    const seconds = (this.#times[steps]! - this.#times[0]!) / 1000;
    // Clocks are coarse: several steps within one tick would give an infinite rate.
    return steps === 0 ? 0 : steps / Math.max(seconds, 1e-6);
  }
}
