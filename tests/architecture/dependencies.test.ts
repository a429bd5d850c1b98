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
