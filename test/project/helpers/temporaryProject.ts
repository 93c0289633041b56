import { execFile } from 'node:child_process';
import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { root } from './repository.js';

/** What a program wrote. */
export interface Output {
  readonly stdout: string;
  readonly stderr: string;
}

/** Scripts of the development tools, which a temporary project borrows instead of installing. */
export const tools = {
  tsc: join(root, 'node_modules/typescript/bin/tsc'),
  tsx: join(root, 'node_modules/tsx/dist/cli.mjs'),
  vite: join(root, 'node_modules/vite/bin/vite.js'),
} as const;

/** Runs a program to its end and gives what it wrote; rejects with all of that where it fails. */
export function run(file: string, parameters: readonly string[], folder: string): Promise<Output> {
  // The test runner's mode and npm's own settings for this package are no business of the other project.
  const env = Object.fromEntries(
    Object.entries(process.env).filter(
      ([name]) => !/^(NODE_ENV|VITEST.*|npm_(package|lifecycle)_.*|npm_config_local_prefix)$/.test(name),
    ),
  );
  const options = { cwd: folder, env, maxBuffer: 1e8, shell: process.platform === 'win32' && file === 'npm' };
  return new Promise((resolve, reject) => {
    execFile(file, parameters, options, (error, stdout, stderr) => {
      const told = () => `${stdout}\n${stderr}`.replace(/.{400}.+/g, (line) => `${line.slice(0, 400)}…`);
      if (error) reject(new Error(`${file} ${parameters.join(' ')} in ${folder}\n${told()}`));
      else resolve({ stdout, stderr });
    });
  });
}

/** Runs a script under Node. */
export function node(parameters: readonly string[], folder: string): Promise<Output> {
  return run(process.execPath, parameters, folder);
}

/** An empty project in a folder of its own outside this repository. */
export class TemporaryProject {
  private constructor(readonly folder: string) {}

  static async create(): Promise<TemporaryProject> {
    const project = new TemporaryProject(await mkdtemp(join(tmpdir(), 'leadline-')));
    await project.write('package.json', JSON.stringify({ name: 'empty', private: true, type: 'module' }));
    return project;
  }

  write(path: string, text: string): Promise<void> {
    return writeFile(join(this.folder, path), text);
  }

  install(...packages: string[]): Promise<Output> {
    return run('npm', ['install', '--prefer-offline', '--no-audit', '--no-fund', ...packages], this.folder);
  }

  remove(): Promise<void> {
    return rm(this.folder, { recursive: true, force: true });
  }
}
