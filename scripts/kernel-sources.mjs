// Reads the formulas of src/numeric that are marked `@kernel`, and writes the formulas that follow from them.
//
// `@kernel` alone: the function is a kernel as it stands; `<name>_<parameter>` beside it is its partial derivative.
// `@kernel located <kind>` or `@kernel scaled <kind>`: the function belongs to the standard member of a family with
// a location and a scale, or with a scale; the formula of any member is written here. Its first argument, where the
// kind has one, is z = (x − location) / scale, a probability or noise; the others are the family's shapes.
// `@joint <family> <parameter>`: the function gives a parameter of that family from others; every kernel of the
// family is written again in those.
import { readdirSync, readFileSync } from 'node:fs';
import { basename, join, relative } from 'node:path';
import ts from 'typescript';

function filesBelow(folder) {
  return readdirSync(folder, { withFileTypes: true }).flatMap((entry) => {
    const path = join(folder, entry.name);
    if (entry.isDirectory()) return filesBelow(path);
    return entry.name.endsWith('.ts') ? [path] : [];
  });
}

function tagOf(f, name) {
  const tag = ts.getJSDocTags(f).find((t) => t.tagName.text === name);
  return tag && (ts.getTextOfJSDocComment(tag.comment) ?? '').trim().split(/\s+/).filter(Boolean);
}

function exportedFunctions(path) {
  const source = ts.createSourceFile(path, readFileSync(path, 'utf8'), ts.ScriptTarget.ES2022, true);
  return source.statements
    .filter(ts.isFunctionDeclaration)
    .filter((f) => f.modifiers?.some((m) => m.kind === ts.SyntaxKind.ExportKeyword))
    .map((f) => ({
      name: f.name.text,
      // A leading underscore only says that the formula does not read the parameter.
      parameters: f.parameters.map((p) => p.name.text.replace(/^_/, '')),
      kernel: tagOf(f, 'kernel'),
      joint: tagOf(f, 'joint'),
    }));
}

/** A function's text; a parameter that its body does not read gets a leading underscore. */
function signature(name, parameters, body) {
  const written = parameters.map((p) => `${new RegExp(`\\b${p}\\b`).test(body) ? '' : '_'}${p}: number`);
  return `export function ${name}(${written.join(', ')}): number {\n  ${body}\n}`;
}

/** What a member's formula is, and its partial derivatives, given the standard one's. */
const kinds = {
  density: {
    leading: true,
    value: (f) => `return ${f()} - Math.log(scale);`,
    lead: (f) => `return ${f('z')} / scale;`,
    location: (f) => `return -${f('z')} / scale;`,
    scale: (f) =>
      f.has('spread')
        ? `return -${f('spread')} / scale;`
        : `const slope = ${f('z')};\n  return -((slope === 0.0 ? 0.0 : ${f.z} * slope) + 1.0) / scale;`,
    shape: (f, p) => `return ${f(p)};`,
  },
  probability: {
    leading: true,
    value: (f) => `return ${f()};`,
    lead: (f) => `return ${f('z')} / scale;`,
    location: (f) => `return -${f('z')} / scale;`,
    scale: (f) => `const slope = ${f('z')};\n  return slope === 0.0 ? 0.0 : -(${f.z} * slope) / scale;`,
    shape: (f, p) => `return ${f(p)};`,
  },
  point: {
    leading: true,
    value: (f) => `return ${f.located ? 'location + ' : ''}scale * ${f()};`,
    lead: (f) => `return scale * ${f(f.leadName)};`,
    location: () => 'return 1.0;',
    scale: (f) => `return ${f()};`,
    shape: (f, p) => `return scale * ${f(p)};`,
  },
  center: {
    leading: false,
    value: (f) => `return ${f.located ? 'location + ' : ''}scale * ${f()};`,
    location: () => 'return 1.0;',
    scale: (f) => `return ${f()};`,
    shape: (f, p) => `return scale * ${f(p)};`,
  },
  spread: {
    leading: false,
    value: (f) => `return scale * scale * ${f()};`,
    location: () => 'return 0.0;',
    scale: (f) => `return 2.0 * scale * ${f()};`,
    shape: (f, p) => `return scale * scale * ${f(p)};`,
  },
  entropy: {
    leading: false,
    value: (f) => `return ${f()} + Math.log(scale);`,
    location: () => 'return 0.0;',
    scale: () => 'return 1.0 / scale;',
    shape: (f, p) => `return ${f(p)};`,
  },
  // A draw that a sampler made: only how it moves with the parameters.
  slope: {
    leading: true,
    value: () => 'return x;',
    lead: () => 'return 1.0;',
    location: () => 'return 1.0;',
    scale: (f) => `return ${f.z};`,
    shape: (f, p) => `return scale * ${f(p)};`,
  },
};

/** The kernels of one standard member's formula: text of its functions, and what the catalogue needs. */
function placed(f, functions) {
  const [where, kindName] = f.kernel;
  const kind = kinds[kindName];
  if (!['located', 'scaled'].includes(where) || !kind)
    throw new Error(`${f.name}: @kernel ${f.kernel.join(' ')} is not known`);
  const located = where === 'located';
  const onZ = kind.leading && kindName !== 'point';
  const leadName = kind.leading ? f.parameters[0] : undefined;
  const shapes = f.parameters.slice(kind.leading ? 1 : 0);
  const reads = {
    density: located,
    probability: located,
    point: located,
    center: located,
    slope: located,
    spread: false,
    entropy: false,
  }[kindName];
  const parameters = [
    ...(kind.leading ? [onZ ? 'x' : leadName] : []),
    ...(reads ? ['location'] : []),
    'scale',
    ...shapes,
  ];
  const z = located ? '((x - location) / scale)' : '(x / scale)';
  const standard = (suffix) => {
    const name = suffix === undefined ? f.name : `${f.name}_${suffix}`;
    return `standard_${name}(${[...(kind.leading ? [onZ ? z : leadName] : []), ...shapes].join(', ')})`;
  };
  Object.assign(standard, { z, leadName, located, has: (s) => functions.has(`${f.name}_${s}`) });
  const used = (name) => functions.has(`${f.name}_${name}`);
  const text = [signature(f.name, parameters, kind.value(standard))];
  const partial = (p) => {
    const name = `${f.name}_${p}`;
    let body;
    if (kind.leading && p === parameters[0]) {
      if (!used(onZ ? 'z' : leadName) && kindName !== 'slope') return undefined;
      body = kind.lead(standard);
    } else if (p === 'location' && !shapes.includes(p)) body = kind.location(standard);
    else if (p === 'scale' && !shapes.includes(p)) body = kind.scale(standard);
    else if (used(p)) body = kind.shape(standard, p);
    else return undefined;
    text.push(signature(name, parameters, body));
    return name;
  };
  const partials = parameters.map(partial);
  const imports = [...functions.keys()].filter((n) => n === f.name || n.startsWith(`${f.name}_`));
  return { name: f.name, parameters, partials, text, imports };
}

/** The kernels of a family in a joint parametrization. */
function joined(kernel, variant, converters, own) {
  const replaced = converters.map((c) => c.parameter);
  const inputs = converters[0].parameters;
  const parameters = [...kernel.parameters.filter((p) => !replaced.includes(p)), ...inputs];
  const name = variant + kernel.name.slice(converters[0].family.length);
  const converted = (p) => {
    const c = converters.find((k) => k.parameter === p);
    return c ? `${c.name}(${inputs.join(', ')})` : p;
  };
  const call = (f) => `${f}(${kernel.parameters.map(converted).join(', ')})`;
  const text = [];
  const needed = new Set();
  const write = (n, body) => text.push(signature(n, parameters, body));
  if (!own.has(name)) write(name, `return ${call(kernel.name)};`);
  needed.add(kernel.name);
  const partials = parameters.map((p) => {
    const partialName = `${name}_${p}`;
    if (own.has(partialName)) return partialName;
    const terms = [];
    let missing = false;
    kernel.parameters.forEach((k, i) => {
      const c = converters.find((d) => d.parameter === k);
      const slope = c
        ? own.has(`${c.name}_${p}`)
          ? `${c.name}_${p}(${inputs.join(', ')})`
          : undefined
        : k === p
          ? ''
          : undefined;
      if (slope === undefined) return;
      if (!kernel.partials[i]) missing = true;
      else {
        needed.add(kernel.partials[i]);
        terms.push(`${call(kernel.partials[i])}${slope ? ` * ${slope}` : ''}`);
      }
    });
    if (missing) return undefined;
    write(partialName, `return ${terms.length > 0 ? terms.join(' + ') : '0.0'};`);
    return partialName;
  });
  return {
    name,
    parameters,
    partials,
    text,
    needed,
    own: [name, ...partials].filter((n) => n && own.has(n)),
  };
}

/**
 * All kernels: `{ name, parameters, partials, module }`, where `module` is the file that has the functions; and
 * the text of the file with the formulas written here.
 */
export function kernelSources(root) {
  const numeric = join(root, 'src/numeric');
  const derived = 'src/kernels/generated/derived';
  const kernels = [];
  const imports = [];
  const text = [];
  const joints = [];
  const families = new Map();
  const modules = new Map();
  for (const path of filesBelow(numeric).sort()) {
    const module = relative(root, path).replace(/\.ts$/, '');
    const family = module.startsWith('src/numeric/families/') ? basename(module) : undefined;
    const functions = new Map(exportedFunctions(path).map((f) => [f.name, f]));
    const importStandard = [];
    const joint = new Map();
    for (const f of functions.values()) {
      if (f.joint) {
        const [of, parameter] = f.joint;
        const variant = f.name.slice(0, f.name.length - parameter.length);
        joint.set(variant, [...(joint.get(variant) ?? []), { ...f, family: of, parameter }]);
      }
      if (!f.kernel) continue;
      let found;
      if (f.kernel.length > 0) {
        const made = placed(f, functions);
        text.push(...made.text);
        importStandard.push(...made.imports);
        found = { name: f.name, parameters: made.parameters, partials: made.partials, module: derived };
      } else {
        const partials = f.parameters.map((p) =>
          functions.has(`${f.name}_${p}`) ? `${f.name}_${p}` : undefined,
        );
        found = { name: f.name, parameters: f.parameters, partials, module };
      }
      kernels.push(found);
      if (family) families.set(family, [...(families.get(family) ?? []), found]);
      modules.set(f.name, found.module);
    }
    if (importStandard.length > 0) {
      imports.push(
        `import { ${importStandard.map((n) => `${n} as standard_${n}`).join(', ')} } from '../../${module.replace(/^src\//, '')}.js';`,
      );
    }
    for (const [variant, converters] of joint) joints.push({ variant, converters, module, functions });
  }
  for (const { variant, converters, module, functions } of joints) {
    const own = new Set(functions.keys());
    const { family } = converters[0];
    const names = new Set(
      converters.flatMap((c) => [...own].filter((n) => n === c.name || n.startsWith(`${c.name}_`))),
    );
    for (const kernel of families.get(family) ?? []) {
      const belongs = kernel.name.startsWith(family) && /^[A-Z]/.test(kernel.name.slice(family.length));
      if (!belongs || kernel.name.endsWith('Kl')) continue;
      if (!kernel.parameters.some((p) => converters.some((c) => c.parameter === p))) continue;
      const made = joined(kernel, variant, converters, own);
      if (own.has(made.name) && functions.get(made.name).kernel) continue;
      text.push(...made.text);
      for (const n of made.own) names.add(n);
      if (kernel.module !== derived) {
        imports.push(
          `import { ${[...made.needed].join(', ')} } from '../../${kernel.module.replace(/^src\//, '')}.js';`,
        );
      }
      kernels.push({
        name: made.name,
        parameters: made.parameters,
        partials: made.partials,
        module: derived,
        own: new Set(made.own),
        ownModule: module,
      });
    }
    for (const c of converters) {
      const partials = c.parameters.map((p) => (own.has(`${c.name}_${p}`) ? `${c.name}_${p}` : undefined));
      kernels.push({ name: c.name, parameters: c.parameters, partials, module });
    }
    imports.push(`import { ${[...names].join(', ')} } from '../../${module.replace(/^src\//, '')}.js';`);
  }
  const names = kernels.map((k) => k.name);
  const twice = names.filter((name, i) => names.indexOf(name) !== i);
  if (twice.length > 0) throw new Error(`two kernels share the name ${twice[0]}`);
  return { kernels, derived: `${mergeImports(imports, text.join('\n\n'))}\n\n${text.join('\n\n')}\n` };
}

/** One import of each name that the text reads. */
function mergeImports(imports, text) {
  const read = new Set(text.match(/\w+/g));
  const byModule = new Map();
  for (const line of imports) {
    const [, names, module] = /^import \{ (.*) \} from '(.*)';$/.exec(line);
    const set = byModule.get(module) ?? new Set();
    for (const n of names.split(', ')) if (read.has(n.split(' ').at(-1))) set.add(n);
    byModule.set(module, set);
  }
  return [...byModule]
    .filter(([, set]) => set.size > 0)
    .map(([module, set]) => `import { ${[...set].join(', ')} } from '${module}';`)
    .join('\n');
}

/** The files that a kernel's functions are imported from, with the names from each. */
export function importsOf(kernel) {
  const functions = [kernel.name, ...kernel.partials.filter(Boolean)];
  if (!kernel.own) return [[kernel.module, functions]];
  const ownNames = functions.filter((n) => kernel.own.has(n));
  const rest = functions.filter((n) => !kernel.own.has(n));
  return [
    [kernel.module, rest],
    [kernel.ownModule, ownNames],
  ].filter(([, n]) => n.length > 0);
}
