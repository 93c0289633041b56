/** What early stopping remembers: a plain JSON value. */
export type StoppingState = {
  /** The best held-out bound so far, in nats per data point; null before the first finite one. */
  readonly best: number | null;
  /** The step that it was measured after; 0 before the first. */
  readonly bestStep: number;
  /** Evaluations since then. */
  readonly waited: number;
};

/** Before the first evaluation. */
export const freshStopping: StoppingState = { best: null, bestStep: 0, waited: 0 };

/** The state after one more evaluation, an improvement if it exceeds the best by more than `margin` nats. */
export function judge(state: StoppingState, step: number, bound: number, margin: number): StoppingState {
  const improved = state.best === null ? bound > Number.NEGATIVE_INFINITY : bound > state.best + margin;
  return improved ? { best: bound, bestStep: step, waited: 0 } : { ...state, waited: state.waited + 1 };
}
