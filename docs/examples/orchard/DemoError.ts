/** Something that the person at the keyboard can put right: shown as one line, without a stack trace. */
export class DemoError extends Error {
  override readonly name = 'DemoError';
}
