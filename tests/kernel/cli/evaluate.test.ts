import { spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { resultsFile, type ResultsFile } from '@stillroom/shared/notebook-file';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { commandLine } from '../../support/engine.ts';

let folder = '';
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'stillroom-cli-'));
});
afterAll(() => rmSync(folder, { recursive: true }));

const cell = (kind: string, name: string, text: string, settings: unknown = {}) => ({
  id: `id-${name}`,
  kind,
  name,
  text,
  settings,
  held: false,
});
const decay = [
  cell('prose', '', '# Decay\n\nLeft: =[run1.species.A, last, 3 digits, unit].'),
  cell('network', 'decay', 'A -> B | k = 0.5 /s\nstart A = 8 uM'),
  { ...cell('trajectory', 'run1', '', { network: 'decay', until: 2 }), held: true },
  cell('structure', 'shape', '', { network: 'decay' }),
  cell('claim', 'claim1', 'abs(last(run1.species.A) - 8 * 2.718281828459045^(0 - 1)) < 1e-4'),
  cell('script', 'script1', 'print("hello"); return math.max(run1.species.B)', { draws: ['run1'] }),
];

const notebook = (cells: unknown[], rest: object = {}) =>
  JSON.stringify({ format: 'stillroom-notebook/1', title: 'T', subject: 'none', cells, ...rest });

function run(text: string | null, ...options: string[]) {
  const file = join(folder, 'a.stillroom.json');
  if (text !== null) writeFileSync(file, text);
  const { status, stdout, stderr } = spawnSync(process.execPath, [commandLine, file, ...options], {
    encoding: 'utf8',
  });
  return { status, stdout, stderr };
}
const results = (stdout: string): ResultsFile => resultsFile.parse(JSON.parse(stdout)) as ResultsFile;

describe('a notebook that computes', () => {
  test('gives every cell, held ones too, under its name, and status 0; twice the same bytes', () => {
    const first = run(notebook(decay));
    expect(first.stderr).toBe('');
    expect(first.status).toBe(0);
    const { cells } = results(first.stdout);
    expect(Object.keys(cells)).toEqual(['id-', 'decay', 'run1', 'shape', 'claim1', 'script1']);
    expect(Object.values(cells).map(({ status }) => status)).toEqual(Array.from({ length: 6 }, () => 'ok'));
    expect(cells['claim1']?.result).toMatchObject({ verdict: 'holds' });
    expect(cells['script1']?.result).toMatchObject({ printed: ['hello'] });
    expect(cells['id-']?.result).toMatchObject({
      values: [{ path: 'run1.species.A', text: '2.94\u00a0µM' }],
    });
    expect(run(notebook(decay)).stdout).toBe(first.stdout);
  });

  test('gives one cell, computed with what it draws on', () => {
    const { status, stdout } = run(notebook(decay), '--cell', 'claim1');
    expect(status).toBe(0);
    expect(Object.keys(results(stdout).cells)).toEqual(['claim1']);
  });

  test('writes into a file and then says nothing', () => {
    const out = join(folder, 'out.json');
    expect(run(notebook(decay), `--out=${out}`, '--cell', 'shape')).toEqual({
      status: 0,
      stdout: '',
      stderr: '',
    });
    expect(results(readFileSync(out, 'utf8')).cells['shape']?.status).toBe('ok');
  });
});

test('cells that fail give status 1 and reasons; the others go on, a claim is undecided', () => {
  const { status, stdout } = run(
    notebook([
      cell('network', 'broken', '# a comment\n\nA -> \nB -> C'),
      cell('trajectory', 'run1', '', { network: 'broken', until: 2 }),
      cell('claim', 'claim1', 'last(run1.species.A) > 1'),
      cell('structure', 'lost', '', { network: 'nowhere' }),
      cell('script', 'endless', 'print("so far"); throw new Error("on purpose")'),
      cell('network', 'sound', 'A -> B'),
    ]),
  );
  expect(status).toBe(1);
  const { cells } = results(stdout);
  expect(cells['broken']).toMatchObject({ status: 'failed', error: { line: 3 } });
  expect(cells['run1']?.error?.message).toContain('broken cannot be read. Line 3:');
  expect(cells['claim1']).toMatchObject({ status: 'ok', result: { verdict: 'undecided' } });
  expect(cells['lost']).toMatchObject({
    digest: null,
    error: { message: 'There is no cell called nowhere.' },
  });
  expect(cells['endless']).toMatchObject({
    error: { message: 'on purpose', line: 1 },
    result: { printed: ['so far'], value: null },
  });
  expect(cells['sound']?.status).toBe('ok');
});

describe('what cannot be read gives status 2 and one sentence', () => {
  test.each([
    ['{"format": "stillroom-notebook/1", "cells": [', 'line 1, column 46'],
    ['', 'The file is empty.'],
    ['{}', 'The file is no notebook'],
    ['[]', 'The file is no notebook'],
    [notebook([], { format: 'stillroom-notebook/2' }), 'this version reads stillroom-notebook/1'],
    [notebook([], { author: 'me' }), 'no setting called "author"'],
    [notebook([{ ...cell('claim', 'a', '1 == 1'), colour: 'red' }]), 'no key in cells[0] called "colour"'],
    [
      notebook([cell('claim', 'a', '1 == 1'), cell('claim', 'a', '1 == 1')]),
      'Cells 1 and 2 of the file are both called a.',
    ],
    [notebook([cell('dream', 'a', '')]), 'of a kind "dream"'],
    [notebook([cell('claim', '1a', '')]), 'has the name "1a"'],
  ])('%s', (text, words) => {
    const { status, stdout, stderr } = run(text);
    expect(stderr).toContain(words);
    expect(stderr.trim().split('\n')).toHaveLength(1);
    expect(stderr).not.toMatch(/\bat .*:\d+:\d+/u);
    expect({ status, stdout }).toEqual({ status: 2, stdout: '' });
  });

  test('a file that is not there, a folder, bytes that are no text, a cell that is not there, wrong options', () => {
    const at = (...words: string[]) =>
      spawnSync(process.execPath, [commandLine, ...words], { encoding: 'utf8' });
    expect(at(join(folder, 'nothing.json'))).toMatchObject({
      status: 2,
      stderr: `${folder}/nothing.json does not exist.\n`,
    });
    expect(at(folder)).toMatchObject({ status: 2, stderr: `${folder} is a folder.\n` });
    writeFileSync(join(folder, 'bytes'), Buffer.from([0xff, 0xfe, 0x00]));
    expect(at(join(folder, 'bytes')).stderr).toContain('no text in UTF-8');
    expect(run(notebook(decay), '--cell', 'nobody').stderr).toContain('has no cell called nobody.');
    expect(at().stderr).toMatch(/^A file is needed\. Usage: /u);
    expect(at('x', '--wrong').stderr).toContain('There is no option --wrong.');
    expect(at('x', '--cell').stderr).toContain('--cell needs a name after it.');
    expect(run(notebook(decay), '--out', '/nowhere/out.json')).toMatchObject({
      status: 2,
      stderr: '/nowhere/out.json does not exist.\n',
    });
  });
});
