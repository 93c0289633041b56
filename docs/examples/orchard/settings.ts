import { resolve } from 'node:path';
import { parseArgs } from 'node:util';
import { DemoError } from './DemoError.js';

/** What the command line says. */
export interface Settings {
  /** The user's own file; left out, the invented one is written and read. */
  readonly data?: string;
  /** Columns that the model must not see; left out, those of the invented causes that the file has. */
  readonly hidden?: readonly string[];
  readonly ignore: readonly string[];
  readonly latents: number;
  readonly steps: number;
  readonly seed: number;
  /** How many fruits are invented. */
  readonly fruits: number;
  readonly out: string;
}

export const usage = `Usage: npm run demo -- [options]

Trains a model of near-infrared spectra with hidden causes and reports what it found.

  --data FILE      a CSV file of your own: a header, then one row of numbers per thing measured
                   (default: the spectra of an invented orchard, written anew)
  --hidden A,B     columns that the model must not see, to be compared with what it finds
                   (default: those of ripeness, water, bruise and depth that the file has)
  --ignore A,B     columns to leave out, such as names
  --latents N      dimensions of the latent space, 2 or more (default 8)
  --steps N        training steps of 100 rows each (default 3000)
  --seed N         the seed of everything random (default 1)
  --fruits N       how many fruits to invent, where no file is given (default 2400)
  --out FOLDER     where the pictures go (default demo-output)
  --help           this text`;

const help = 'npm run demo -- --help lists the options';

/** Reads the command line; undefined where only the usage is asked for. */
export function readSettings(args: readonly string[]): Settings | undefined {
  const values = parse(args);
  if (values.help) return undefined;
  if (values.data !== undefined && values.fruits !== undefined) {
    throw new DemoError(`demo: --fruits must be left out where --data names a file; ${help}`);
  }
  // npm starts scripts in the package's folder; a path that was typed belongs to the folder it was typed in.
  const from = process.env.INIT_CWD ?? process.cwd();
  const hidden = names('hidden', values.hidden);
  return {
    ...(values.data === undefined ? {} : { data: resolve(from, values.data) }),
    ...(hidden === undefined ? {} : { hidden }),
    ignore: names('ignore', values.ignore) ?? [],
    latents: whole('latents', values.latents ?? '8', 2, 64),
    steps: whole('steps', values.steps ?? '3000', 10, 1_000_000),
    seed: whole('seed', values.seed ?? '1', 0, Number.MAX_SAFE_INTEGER),
    fruits: whole('fruits', values.fruits ?? '2400', 50, 100_000),
    out: values.out === undefined ? resolve('demo-output') : resolve(from, values.out),
  };
}

function parse(args: readonly string[]) {
  const text = { type: 'string' } as const;
  try {
    return parseArgs({
      args: [...args],
      options: {
        data: text,
        hidden: text,
        ignore: text,
        latents: text,
        steps: text,
        seed: text,
        fruits: text,
        out: text,
        help: { type: 'boolean' },
      },
    }).values;
  } catch (error) {
    const { code, message } = error as NodeJS.ErrnoException;
    if (code === 'ERR_PARSE_ARGS_UNEXPECTED_POSITIONAL') {
      const stray = /'(.*?)'/.exec(message)?.[1] ?? '';
      throw new DemoError(
        `demo: every argument must belong to an option, and options must follow a -- of their own; got "${stray}"; write for example npm run demo -- --data "${stray}"`,
      );
    }
    const [what = ''] = message.split(/\.(?:\s|$)|\n/);
    throw new DemoError(`demo: ${what[0]!.toLowerCase()}${what.slice(1)}; ${help}`);
  }
}

function names(option: string, value: string | undefined): string[] | undefined {
  if (value === undefined) return undefined;
  const list = value.split(',').map((name) => name.trim());
  if (list.includes('')) {
    throw new DemoError(
      `demo: --${option} must be column names with commas between; got "${value}"; ${help}`,
    );
  }
  return list;
}

function whole(option: string, value: string, least: number, most: number): number {
  const number = Number(value);
  if (!/^\d+$/.test(value) || !(number >= least && number <= most)) {
    throw new DemoError(
      `demo: --${option} must be a whole number from ${least} to ${most}; got "${value}"; ${help}`,
    );
  }
  return number;
}
