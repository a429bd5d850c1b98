import { describe, expect, test } from 'vitest';
import { type SourceFile, sourcesUnder, target } from '../support/sources.ts';

/** Which packages each package may name. The client's web worker is the one place that may load the kernel. */
const mayImport: Readonly<Record<string, readonly string[]>> = {
  shared: [],
  kernel: ['shared'],
  server: ['shared', 'kernel'],
  client: ['shared'],
};

const packages = Object.keys(mayImport);
const sources = new Map(packages.map((name) => [name, sourcesUnder(`packages/${name}/src`)]));

const named = (file: SourceFile) =>
  file.imports.flatMap((specifier) => /^@stillroom\/([a-z]+)/.exec(specifier)?.[1] ?? []);

describe('imports between packages', () => {
  test.each(packages)('%s names only what stands beneath it', (name) => {
    const wrong = (sources.get(name) ?? []).flatMap((file) =>
      named(file)
        .filter((other) => !(mayImport[name] ?? []).includes(other))
        .filter((other) => !(name === 'client' && other === 'kernel' && /\.worker\.ts$/.test(file.path)))
        .map((other) => `${file.path} imports ${other}`),
    );
    expect(wrong).toEqual([]);
  });

  test.each(packages)('%s reaches other packages through their doors, never by a path', (name) => {
    const wrong = (sources.get(name) ?? []).flatMap((file) =>
      file.imports
        .filter((specifier) => specifier.startsWith('.'))
        .filter((specifier) => !target(file, specifier).startsWith(`packages/${name}/`))
        .map((specifier) => `${file.path} imports ${specifier}`),
    );
    expect(wrong).toEqual([]);
  });

  test('the kernel and its worker know neither the live document, the network nor a database', () => {
    const forbidden =
      /^(yjs|y-.*|express|pg|typeorm|ws|node:(http|https|net|dgram|tls)|@stillroom\/shared\/document)$/;
    const wrong = (sources.get('kernel') ?? []).flatMap((file) =>
      file.imports
        .filter((specifier) => forbidden.test(specifier))
        .map((specifier) => `${file.path}: ${specifier}`),
    );
    expect(wrong).toEqual([]);
  });
});

describe('files', () => {
  /** Files that import each other in a circle; each circle once. */
  function circles(files: readonly SourceFile[]): string[][] {
    const known = new Set(files.map(({ path }) => path));
    const edges = new Map(
      files.map((file) => [
        file.path,
        file.imports
          .filter((specifier) => specifier.startsWith('.'))
          .map((specifier) => target(file, specifier))
          .filter((path) => known.has(path)),
      ]),
    );
    const reached = new Map([...known].map((path) => [path, reachedFrom(path, edges)]));
    const inCircles = [...known].filter((path) => reached.get(path)?.has(path));
    const circleOf = (path: string) =>
      inCircles.filter((other) => reached.get(path)?.has(other) && reached.get(other)?.has(path)).sort();
    return inCircles.map(circleOf).filter(([first], index) => first === inCircles[index]);
  }

  /** Everything that a file imports, directly or not. */
  function reachedFrom(path: string, edges: ReadonlyMap<string, readonly string[]>): Set<string> {
    const reached = new Set(edges.get(path));
    for (const one of reached) for (const other of edges.get(one) ?? []) reached.add(other);
    return reached;
  }

  test.each(packages)('of %s never import each other in a circle, not even for their types', (name) => {
    expect(circles(sources.get(name) ?? [])).toEqual([]);
  });
});

describe('modules of the server', () => {
  const order = [
    ['files', 'mail'],
    ['auth'],
    ['groups'],
    ['notebooks'],
    ['collaboration', 'compute'],
    ['records'],
    ['reviews'],
    ['shelf', 'operator'],
  ];
  const rank = (module: string) => order.findIndex((level) => level.includes(module));
  const moduleOf = (path: string) => /^packages\/server\/src\/modules\/([^/]+)\//.exec(path)?.[1] ?? null;
  const files = (sources.get('server') ?? []).filter((file) => moduleOf(file.path) !== null);

  test('every module stands in the order', () => {
    const modules = new Set(files.map((file) => moduleOf(file.path) ?? ''));
    expect([...modules].filter((module) => rank(module) === -1)).toEqual([]);
  });

  test('a module calls only modules beneath it, and only through their index', () => {
    const wrong = files.flatMap((file) => {
      const own = moduleOf(file.path) ?? '';
      return file.imports
        .filter((specifier) => specifier.startsWith('.'))
        .map((specifier) => target(file, specifier))
        .filter((path) => moduleOf(path) !== null && moduleOf(path) !== own)
        .filter(
          (path) => rank(moduleOf(path) ?? '') > rank(own) || !/\/(index|entities\/[^/]+)\.ts$/.test(path),
        )
        .map((path) => `${file.path} imports ${path}`);
    });
    expect(wrong).toEqual([]);
  });
});
