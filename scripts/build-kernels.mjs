// Turns the scalar formulas of src/numeric into one WebAssembly module and a catalogue of its kernels.
//
// Which formulas become kernels: see kernel-sources.mjs. For each the build writes an array loop, compiles all of them with AssemblyScript together with the files
// of src/kernels/assembly, and embeds the module as text, so that loading it needs no download.
import { mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import asc from 'assemblyscript/asc';
import { importsOf, kernelSources } from './kernel-sources.mjs';

const root = join(dirname(fileURLToPath(import.meta.url)), '..');
const assembly = join(root, 'src/kernels/assembly');
const generated = join(root, 'src/kernels/generated');

const { kernels, derived } = kernelSources(root);

// ---- the generated AssemblyScript: one block loop per formula and partial, and the table that finds it
const loops = [];
function addLoop(name, arity) {
  const at = [...Array(arity).keys()];
  loops.push(`function block${loops.length}(n: i32, out: usize, operands: usize): void {
${at.map((k) => `  let p${k} = load<usize>(operands, ${8 * k}); const s${k} = <usize>load<i32>(operands, ${8 * k + 4});`).join('\n')}
  for (let i = 0; i < n; i++) {
    store<f64>(out, ${name}(${at.map((k) => `load<f64>(p${k})`).join(', ')}));
    out += 8;${at.map((k) => ` p${k} += s${k};`).join('')}
  }
}`);
  return loops.length - 1;
}
for (const kernel of kernels) {
  kernel.index = addLoop(kernel.name, kernel.parameters.length);
  kernel.partialIndex = kernel.partials.map((p) => (p ? addLoop(p, kernel.parameters.length) : -1));
}
const imports = kernels
  .flatMap(importsOf)
  .map(([module, names]) => `import { ${names.join(', ')} } from '../../../${module}';`)
  .join('\n');
const sources = new Map([
  ['src/kernels/generated/derived.ts', derived],
  [
    'src/kernels/assembly/table.ts',
    `${imports}\n${loops.join('\n')}\nexport const TABLE: StaticArray<(n: i32, out: usize, operands: usize) => void> = [${loops.map((_, i) => `block${i}`).join(', ')}];\n`,
  ],
  [
    'entry.ts',
    readdirSync(assembly)
      .filter((name) => name.endsWith('.ts') && !name.startsWith('_'))
      .map((name) => `export * from './src/kernels/assembly/${name.replace(/\.ts$/, '')}';`)
      .join('\n'),
  ],
]);

function readSource(name) {
  const path = name.replace(/\.js\.ts$/, '.ts');
  if (sources.has(path)) return sources.get(path);
  try {
    return readFileSync(join(root, path), 'utf8');
  } catch {
    return null;
  }
}

const outputs = new Map();
const { error, stderr } = await asc.main(
  [
    'entry.ts',
    '--outFile',
    'module.wasm',
    '--runtime',
    'stub',
    '-O3',
    '--noAssert',
    '--enable',
    'simd',
    '--use',
    'abort=',
  ],
  { readFile: readSource, writeFile: (name, data) => outputs.set(name, data), listFiles: () => [] },
);
if (error) {
  console.error(stderr.toString());
  throw error;
}

const bytes = outputs.get('module.wasm');
mkdirSync(generated, { recursive: true });
writeFileSync(
  join(generated, 'moduleBytes.ts'),
  `/** The compiled module, ${bytes.length} bytes, base64. */\nexport const moduleBytes =\n  '${Buffer.from(bytes).toString('base64')}';\n`,
);
writeFileSync(join(generated, 'derived.ts'), derived);
writeFileSync(
  join(generated, 'catalogue.ts'),
  `/** Where each kernel and its partial derivatives (-1: none) stand in the compiled module. */
export const catalogue = {
${kernels
  .map(
    (k) =>
      `  ${k.name}: { index: ${k.index}, parameters: [${k.parameters.map((p) => `'${p}'`).join(', ')}], partials: [${k.partialIndex.join(', ')}] },`,
  )
  .join('\n')}
} as const;
`,
);
// For the tests: the same formulas as ordinary TypeScript.
writeFileSync(
  join(generated, 'formulas.ts'),
  `${kernels
    .flatMap(importsOf)
    .map(
      ([module, names]) => `import { ${names.join(', ')} } from '../../${module.replace(/^src\//, '')}.js';`,
    )
    .join('\n')}

/** Every kernel's formula and partials as ordinary functions, to hold the compiled module to. */
export const formulas = {
${kernels.map((k) => `  ${k.name}: { value: ${k.name}, partials: [${k.partials.map((p) => p ?? 'undefined').join(', ')}] },`).join('\n')}
};
`,
);
console.log(`kernels: ${kernels.length} kernels, ${loops.length} loops, ${bytes.length} bytes`);
