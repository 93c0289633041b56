import { expect, it } from 'vitest';
import { DemoError } from '../../docs/examples/orchard/DemoError.js';
import { readSettings } from '../../docs/examples/orchard/settings.js';

const help = 'npm run demo -- --help lists the options';

it.each([
  [['--foo'], `demo: unknown option '--foo'; ${help}`],
  [
    ['my.csv'],
    'demo: every argument must belong to an option, and options must follow a -- of their own; got "my.csv"; write for example npm run demo -- --data "my.csv"',
  ],
  [['--steps', 'many'], `demo: --steps must be a whole number from 10 to 1000000; got "many"; ${help}`],
  [['--steps', '9'], `demo: --steps must be a whole number from 10 to 1000000; got "9"; ${help}`],
  [['--latents', '1'], `demo: --latents must be a whole number from 2 to 64; got "1"; ${help}`],
  [['--seed', '1.5'], `demo: --seed must be a whole number from 0 to 9007199254740991; got "1.5"; ${help}`],
  [['--hidden', 'a,,b'], `demo: --hidden must be column names with commas between; got "a,,b"; ${help}`],
  [
    ['--data', 'a.csv', '--fruits', '99'],
    `demo: --fruits must be left out where --data names a file; ${help}`,
  ],
])('refuses %j', (args, message) => {
  expect(() => readSettings(args)).toThrow(new DemoError(message));
});

it('asks for a value where one is missing', () => {
  expect(() => readSettings(['--data'])).toThrow(/^demo: option '--data <value>' argument missing; /);
});

it('reads what it knows', () => {
  expect(readSettings(['--help'])).toBeUndefined();
  expect(readSettings(['--data', '/x/my.csv', '--hidden', 'a, b', '--steps=20', '--out', '/y'])).toEqual({
    data: '/x/my.csv',
    hidden: ['a', 'b'],
    ignore: [],
    latents: 8,
    steps: 20,
    seed: 1,
    fruits: 2400,
    out: '/y',
  });
});
