import { describe, expect, test } from 'vitest';
import { sourcesUnder } from '../support/sources.ts';

const withoutComments = (text: string) => text.replace(/\/\*[\s\S]*?\*\/|\/\/.*$/gm, '');

const sources = ['shared', 'kernel', 'server', 'client'].flatMap((name) =>
  sourcesUnder(`packages/${name}/src`),
);

describe('source files', () => {
  test('none is longer than 600 lines', () => {
    const long = sources
      .map((file) => ({ path: file.path, lines: file.text.split('\n').length }))
      .filter(({ lines }) => lines > 600)
      .map(({ path, lines }) => `${path}: ${lines}`);
    expect(long).toEqual([]);
  });

  test('a door only re-exports', () => {
    const statement = /^(export (type )?(\{[^}]*\}|\*( as \w+)?) from '[^']+';\s*)*$/s;
    const wrong = sources
      .filter((file) => /^packages\/shared\/src\/[^/]+\/index\.ts$/.test(file.path))
      .filter((file) => !statement.test(withoutComments(file.text).trim()))
      .map((file) => file.path);
    expect(wrong).toEqual([]);
  });

  test('no checker is told to look away, and no doubt is left in shipped code', () => {
    const away = /@ts-(ignore|expect-error|nocheck)|eslint-disable|\b(TODO|FIXME|XXX)\b/;
    const untyped = /\bas any\b|:\s*any\b/;
    const wrong = sources
      .filter((file) => away.test(file.text) || untyped.test(withoutComments(file.text)))
      .map((file) => file.path);
    expect(wrong).toEqual([]);
  });

  test('the kernel has no clock, no randomness and no arithmetic that differs between machines', () => {
    const pure = sources.filter(
      (file) => file.path.startsWith('packages/kernel/src/') && !/\/src\/(worker|cli)\//.test(file.path),
    );
    const impure =
      /\bMath\.(random|exp|log|log2|log10|log1p|expm1|pow|sin|cos|tan|asin|acos|atan|sinh|cosh|tanh|cbrt|hypot)\b|\bDate\.now\b|\bnew Date\(\)|performance\.now/;
    const wrong = pure.filter((file) => impure.test(withoutComments(file.text))).map((file) => file.path);
    expect(wrong).toEqual([]);
  });
});
