import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { cruise, type ICruiseResult } from 'dependency-cruiser';
import ts from 'typescript';
import { beforeAll, describe, expect, it } from 'vitest';

/** The folders of src/ from the ground up; those in a row are siblings. */
const LAYERS: readonly (readonly string[])[] = [
  ['base'],
  ['algebra', 'units', 'numeric', 'language'],
  ['control'],
  ['figures', 'present'],
  ['functions'],
  ['engine'],
  ['worker'],
  ['ui', 'server', 'memo'],
  ['cli', 'routes'],
];
const ENGINE_LAYER = 5;

const inFolders = (folders: readonly string[]) => `^src/(${folders.join('|')})/`;
const library = (pattern: string) => `^node_modules/${pattern}`;

/** What a folder must not import: siblings, and everything above. */
const layerRules = LAYERS.flatMap((siblings, level) =>
  siblings.map((folder) => ({
    name: `${folder} imports nothing from its siblings or from above`,
    from: { path: inFolders([folder]) },
    to: {
      path: inFolders(
        LAYERS.slice(level)
          .flat()
          .filter((other) => other !== folder),
      ),
    },
  })),
);

/** Which folders may import a library, types included. */
const libraryRules = [
  { library: 'mathjs', pattern: 'mathjs/', folders: ['units', 'numeric'] },
  { library: 'CodeMirror', pattern: '@codemirror/', folders: ['ui'] },
  { library: 'KaTeX', pattern: 'katex/', folders: ['ui', 'memo'] },
  { library: 'd3', pattern: '(@types/)?d3', folders: ['figures', 'ui'] },
  { library: 'chokidar', pattern: 'chokidar/', folders: ['server'] },
  { library: 'Svelte', pattern: '(svelte|@sveltejs)/', folders: ['ui', 'routes'] },
].map(({ library: name, pattern, folders }) => ({
  name: `only ${folders.join(' and ')} imports ${name}`,
  from: { pathNot: inFolders(folders) },
  to: { path: library(pattern) },
}));

const RULES = [
  ...layerRules.filter(({ to }) => to.path !== inFolders([])),
  ...libraryRules,
  {
    name: "a layer is imported through its index.ts, and only its style sheets aren't",
    from: { path: '^src/([^/]+)/' },
    to: { path: '^src/[^/]+/', pathNot: ['^src/$1/', '^src/[^/]+/index\\.ts$', '\\.css$'] },
  },
  {
    name: "only server and cli import Node's modules",
    from: { pathNot: inFolders(['server', 'cli']) },
    to: { dependencyTypes: ['core' as const] },
  },
  {
    name: 'there are no import cycles, types included',
    from: {},
    to: { circular: true },
  },
  {
    name: 'every relative import leads somewhere',
    from: {},
    // What the build makes is no file: the route types, and the terms of the grammar.
    to: { couldNotResolve: true, path: '^\\.', pathNot: ['/\\$types', '\\.grammar\\.terms$'] },
  },
];

describe('the import graph', () => {
  let graph: ICruiseResult;

  beforeAll(async () => {
    const forbidden = RULES.map((rule) => ({ ...rule, severity: 'error' as const }));
    const { output } = await cruise(['src'], {
      validate: true,
      ruleSet: { forbidden },
      tsPreCompilationDeps: true,
      doNotFollow: { path: 'node_modules' },
      enhancedResolveOptions: { extensions: ['.ts', '.js', '.svelte'] },
    });
    graph = output as ICruiseResult;
  });

  it.each(RULES.map(({ name }) => name))('%s', (name) => {
    const violations = graph.summary.violations.filter(({ rule }) => rule.name === name);
    expect(
      violations.map(({ from, to, cycle }) => [
        from,
        ...(cycle ?? [{ name: to }]).map((step) => step.name),
      ]),
    ).toEqual([]);
  });

  it('sees every folder of src as a layer', () => {
    const folders = readdirSync('src', { withFileTypes: true }).map(({ name }) => name);
    expect(folders.filter((folder) => !LAYERS.flat().includes(folder))).toEqual([]);
  });

  it('reads the scripts of Svelte components too', () => {
    const components = graph.modules.filter(({ source }) => source.endsWith('.svelte'));
    expect(components.flatMap(({ dependencies }) => dependencies)).not.toEqual([]);
  });
});

describe('the layers up to the engine', () => {
  /** Clock, randomness and browser: what makes a result depend on when or where it was computed. */
  const FORBIDDEN = [
    ...['Date', 'performance', 'document', 'window', 'navigator', 'localStorage', 'crypto'],
    ...['fetch', 'setTimeout', 'setInterval', 'process', 'self', 'globalThis'],
  ];
  const files = LAYERS.slice(0, ENGINE_LAYER + 1)
    .flat()
    .flatMap((folder) => sourceFiles(join('src', folder)));

  it('use no clock, no randomness and no browser', () => {
    expect(files.length).toBeGreaterThan(0);
    expect(files.flatMap((file) => usesOf(FORBIDDEN, file))).toEqual([]);
  });
});

function sourceFiles(folder: string): string[] {
  return readdirSync(folder, { recursive: true, encoding: 'utf8' })
    .filter((name) => name.endsWith('.ts'))
    .map((name) => join(folder, name));
}

/** Where a file uses one of the global names, or `Math.random`. */
function usesOf(names: readonly string[], file: string): string[] {
  const text = readFileSync(file, 'utf8');
  const source = ts.createSourceFile(file, text, ts.ScriptTarget.Latest, true);
  const nodes = descendants(source);
  // A parameter or a local of that name is not the global.
  const own = new Set(nodes.map(declaredName));
  const foreign = names.filter((name) => !own.has(name));
  return nodes
    .filter((node) => isGlobalUse(node, foreign))
    .map((node) => {
      const { line } = source.getLineAndCharacterOfPosition(node.getStart());
      return `${file}:${line + 1}: ${node.getText()}`;
    });
}

function descendants(node: ts.Node): ts.Node[] {
  const found: ts.Node[] = [node];
  ts.forEachChild(node, (child) => void found.push(...descendants(child)));
  return found;
}

function declaredName(node: ts.Node): string | null {
  const declares =
    ts.isVariableDeclaration(node) ||
    ts.isParameter(node) ||
    ts.isBindingElement(node) ||
    ts.isFunctionDeclaration(node) ||
    ts.isImportSpecifier(node);
  return declares && node.name !== undefined && ts.isIdentifier(node.name) ? node.name.text : null;
}

function isGlobalUse(node: ts.Node, names: readonly string[]): boolean {
  if (ts.isPropertyAccessExpression(node)) return node.getText() === 'Math.random';
  if (!ts.isIdentifier(node) || !names.includes(node.text)) return false;
  const { parent } = node;
  const isMemberName = 'name' in parent && parent.name === node;
  return ts.isShorthandPropertyAssignment(parent) || !isMemberName;
}
