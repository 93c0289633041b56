import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { isBuiltin } from 'node:module';
import { join } from 'node:path';
import ts from 'typescript';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { callSites } from './helpers/callSites.js';
import { findExamples } from './helpers/findExamples.js';
import { importsOf } from './helpers/imports.js';
import { read, root } from './helpers/repository.js';
import { node, run, TemporaryProject, tools } from './helpers/temporaryProject.js';

const manifest = JSON.parse(read('package.json'));
const peers = {
  tensors: `@tensorflow/tfjs@${manifest.devDependencies['@tensorflow/tfjs']}`,
  wasm: `@tensorflow/tfjs-backend-wasm@${manifest.devDependencies['@tensorflow/tfjs-backend-wasm']}`,
};

/** What a new user pastes: the first example of the README that runs and uses the library. */
function firstExample(): string {
  const examples = findExamples('README.md', read('README.md'));
  const first = examples.find(({ kind, code }) => kind === 'compared' && /from 'leadline'/.test(code));
  if (!first)
    throw new Error("README.md must show a complete example that imports from 'leadline' and prints");
  return first.code;
}

function lines(text: string): string[] {
  return text
    .split('\n')
    .map((line) => line.trimEnd())
    .filter((line) => line !== '')
    .sort();
}

const wholeLibrary = "import * as library from 'leadline';\nObject.assign(globalThis, { library });\n";

/** As much of a browser as a bundle needs to start, without a graphics card, Node's own objects or a network. */
const page = `
const element = () => ({ getContext: () => null, addEventListener() {}, relList: { supports: () => true } });
globalThis.window = globalThis;
globalThis.document = { createElement: element, querySelectorAll: () => [], getElementsByTagName: () => [] };
globalThis.process = undefined;
globalThis.Buffer = undefined;
globalThis.fetch = () => Promise.reject(new Error('no download'));
`;

let project: TemporaryProject;
let packed: { filename: string; files: { path: string }[] };
let code: string;
let promised: string[];

beforeAll(async () => {
  if (!existsSync(join(root, 'dist/index.js'))) throw new Error('dist is missing; run npm run build first');
  project = await TemporaryProject.create();
  const pack = await run(
    'npm',
    ['pack', '--ignore-scripts', '--json', '--pack-destination', project.folder],
    root,
  );
  packed = JSON.parse(pack.stdout)[0];
  await project.install(`./${packed.filename}`, peers.tensors);
});

afterAll(() => project?.remove());

describe('the tarball', () => {
  it('holds the build, the licence and the papers, and nothing else', () => {
    const paths = packed.files.map(({ path }) => path);
    const papers = ['CHANGELOG.md', 'LICENSE', 'README.md', 'package.json'];
    expect(paths.filter((path) => !path.startsWith('dist/')).sort()).toEqual(papers);
    expect(paths.filter((path) => !/(\.js|\.d\.ts)$/.test(path) && !papers.includes(path))).toEqual([]);
  });

  it('holds types beside every script', () => {
    const paths = packed.files.map(({ path }) => path);
    const scripts = paths.filter((path) => path.endsWith('.js'));
    expect(scripts.length).toBeGreaterThan(1);
    expect(scripts.filter((path) => !paths.includes(path.replace(/\.js$/, '.d.ts')))).toEqual([]);
  });

  it('names every file it points to', () => {
    const paths = new Set(packed.files.map(({ path }) => `./${path}`));
    const targets = Object.values(manifest.exports).flatMap((entry) =>
      typeof entry === 'string' ? [entry] : Object.values(entry as Record<string, string>),
    );
    expect(targets.filter((target) => !paths.has(target))).toEqual([]);
  });
});

describe('importing the package', () => {
  it('prints nothing and chooses no backend', async () => {
    await project.write(
      'import.js',
      `import * as tf from '@tensorflow/tfjs';
       const before = tf.engine().backendName;
       await import('leadline');
       process.exitCode = before === undefined && tf.engine().backendName === undefined ? 0 : 1;`,
    );
    expect(await node(['import.js'], project.folder)).toEqual({ stdout: '', stderr: '' });
  });

  it('cannot reach past its entry points', async () => {
    await project.write(
      'reach.js',
      "await import('leadline/dist/errors.js').catch((error) => console.log(error.code));",
    );
    expect((await node(['reach.js'], project.folder)).stdout).toBe('ERR_PACKAGE_PATH_NOT_EXPORTED\n');
  });
});

describe("the README's first example", () => {
  beforeAll(async () => {
    code = firstExample();
    promised = callSites(code)
      .flatMap(({ expected }) => expected)
      .filter((line) => line !== '')
      .sort();
    await project.write('main.ts', code);
  });

  it('runs as JavaScript', async () => {
    const { outputText } = ts.transpileModule(code, {
      compilerOptions: {
        target: ts.ScriptTarget.ES2022,
        module: ts.ModuleKind.ESNext,
        verbatimModuleSyntax: true,
      },
    });
    await project.write('main.js', outputText);
    const { stdout } = await node(['main.js'], project.folder);
    expect(lines(stdout)).toEqual(promised);
  });

  it('runs as TypeScript', async () => {
    const { stdout } = await node([tools.tsx, 'main.ts'], project.folder);
    expect(lines(stdout)).toEqual(promised);
  });

  it('type-checks against the packed types, which are themselves free of errors', async () => {
    const parameters = 'main.ts --noEmit --strict --target es2022 --module nodenext --pretty false'.split(
      ' ',
    );
    const told = await node([tools.tsc, ...parameters], project.folder).then(
      () => '',
      (error: Error) => error.message,
    );
    const errors = told.split('\n').filter((line) => line.includes('error TS'));
    // Declarations are checked too, and those of other packages have errors of their own.
    expect(errors.filter((line) => !/^[^(]*\bnode_modules\/(?!leadline\/)/.test(line))).toEqual([]);
    expect(told === '' || errors.length > 0, told).toBe(true);
  });

  describe.each([
    { title: 'without the wasm backend', also: [], start: '' },
    {
      title: 'with the wasm backend',
      also: [peers.wasm],
      start:
        "await library.useFastestBackend({ loadWasm: () => import('@tensorflow/tfjs-backend-wasm') });\n",
    },
  ])('bundled for a browser $title', ({ also, start }) => {
    let output: string;

    beforeAll(async () => {
      if (also.length > 0) await project.install(...also);
      output = join(project.folder, `bundle-${also.length}`);
      await project.write('index.html', '<!doctype html><script type="module" src="/browser.ts"></script>');
      // Preloading is a matter of page speed and would need more of a page than stands in for one below.
      await project.write('vite.config.js', 'export default { build: { modulePreload: false } };');
      // Holding on to the whole of the library keeps the bundler from dropping what the example does not use.
      await project.write('browser.ts', `${wholeLibrary}${start}await import('./main.ts');\n`);
      await node([tools.vite, 'build', '--logLevel', 'warn', '--outDir', output], project.folder);
    });

    it('leaves no import unresolved', () => {
      const assets = join(output, 'assets');
      const scripts = readdirSync(assets).filter((name) => name.endsWith('.js'));
      const imports = scripts.flatMap((name) => importsOf(name, readFileSync(join(assets, name), 'utf8')));
      // What a platform may lack, the library imports only when it is asked for, hidden from bundlers, and does
      // without or says what is missing.
      const mayLack = (name: string) => isBuiltin(name) || name in manifest.peerDependenciesMeta;
      const left = imports.filter(
        ({ specifier, deferred }) => !specifier.startsWith('.') && !(deferred && mayLack(specifier)),
      );
      expect(scripts).not.toEqual([]);
      expect(left.map(({ specifier }) => specifier)).toEqual([]);
    });

    it('runs with what a browser has, without a download', async () => {
      const entry = /src="\/(assets\/[^"]+\.js)"/.exec(readFileSync(join(output, 'index.html'), 'utf8'))?.[1];
      await project.write('page.js', page);
      await project.write(
        'open.js',
        `import './page.js';\nawait import('./bundle-${also.length}/${entry}');\n`,
      );
      const { stdout } = await node(['open.js'], project.folder);
      const own = lines(stdout).filter((line) => !line.startsWith('Could not get context for WebGL'));
      expect(own).toEqual(promised);
    });
  });
});
