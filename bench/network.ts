/** Sizes of a model with one hidden layer on each side, and of its minibatch. */
export interface Sizes {
  readonly name: string;
  readonly data: number;
  readonly hidden: number;
  readonly latent: number;
  readonly batch: number;
}

export const large: Sizes = { name: '900-400-32-400-900', data: 900, hidden: 400, latent: 32, batch: 128 };
export const small: Sizes = { name: '64-128-8-128-64', data: 64, hidden: 128, latent: 8, batch: 100 };

/** One step of training, to be timed. */
export interface Trainable {
  step(): void;
  /** The loss now, to see that both sides train the same model. */
  loss(): number;
  dispose(): void;
}
