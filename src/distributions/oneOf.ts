import type { ParameterValue } from '../tensor/checks.js';

/** Exactly one of several ways to give a parameter; two at once do not compile. */
export type OneOf<Names extends string> = {
  [Name in Names]: { readonly [Given in Name]: ParameterValue } & {
    readonly [Other in Exclude<Names, Name>]?: undefined;
  };
}[Names];
