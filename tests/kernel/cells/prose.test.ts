import type { ProseResult } from '@stillroom/shared/cells';
import { describe, expect, test } from 'vitest';
import { course, drawn, errorOf, jobOf, resultOf } from '../../support/cell-jobs.ts';

const inputs = {
  run1: drawn('trajectory', course),
  shape: drawn('structure', { counts: { deficiency: 1 }, conservative: false, third: '-1/3', rank: null }),
};
const set = (text: string) => resultOf<ProseResult>(jobOf('prose', text, inputs));
const woven = (inside: string) => set(`=[${inside}]`).values[0]?.text;

describe('woven values', () => {
  test.each([
    ['run1.species.P, last, 3 digits', '9.88'],
    ['run1.species.P, last, 1 decimal', '9.9'],
    ['run1.species.P, last', '9.877'],
    ['run1.species.P, at 1', '4'],
    ['run1.species.P, at 3, 3 digits', '8.69'],
    ['run1.species.P, max, 2 digits, unit', '9.9\u00a0µM'],
    ['run1.times, last, unit', '4\u00a0s'],
    ['run1.species.P, mean, 4 digits', '5.344'],
    ['run1.species.P, sd, 3 digits', '4.30'],
    ['run1.species["X[3]"], first', '1'],
    ['run1.derived.ratio[1], percent', '50\u00a0%'],
    ['run1.conservationDrift', '1 × 10⁻¹⁶'],
    ['run1.species.P, last, scientific, 2 digits', '9.9 × 10⁰'],
    ['run1.statistics.steps', '12'],
    ['shape.third', '−1/3'],
    ['shape.third, 3 digits', '−0.333'],
    ['shape.conservative', 'no'],
    ['shape.rank', 'undecided'],
    ['run1.ended', 'complete'],
  ])('%s', (inside, text) => expect(woven(inside)).toBe(text));

  test('stand in the text with their path and cell, and in the list with the digest of the cell', () => {
    const { html, values } = set('It ends at =[run1.species["X[3]"], last].');
    expect(html).toBe(
      '<p>It ends at <span data-path="run1.species[&quot;X[3]&quot;]" data-cell="run1">1</span>.</p>\n',
    );
    expect(values).toEqual([{ path: 'run1.species["X[3]"]', text: '1', digest: inputs.run1.digest }]);
  });

  test.each([
    ['run1.species.P', 'This is a list of 4'],
    ['run1.species.Q, last', 'run1.species has no Q.'],
    ['run1.species, last', 'needs a list'],
    ['run1.species.P, lats', '"lats" is no way to show a value.'],
    ['run1.species.P, at 9', 'runs from 0 to 4'],
    ['absent.x', 'no cell called absent'],
  ])('%s is an error', (inside, words) => {
    const message = errorOf(jobOf('prose', `=[${inside}]`, inputs)).message;
    expect(message).toContain(words);
  });

  test('an error names its line and column', () => {
    expect(errorOf(jobOf('prose', '# One\n\ntwo =[run1.nope]', inputs))).toMatchObject({
      line: 3,
      column: 7,
    });
  });
});

describe('mathematics', () => {
  test('in the line and displayed, for the page to set', () => {
    expect(set('With $a<b$ so').html).toBe('<p>With <span data-tex="a&lt;b">a&lt;b</span> so</p>\n');
    expect(set('$$\nx\n= y\n- z\n$$').html).toBe(
      '<p><span data-tex="x\n= y\n- z" data-display="">x\n= y\n- z</span></p>\n',
    );
  });
  test('money stays money', () => {
    expect(set('$5 and $6').html).toBe('<p>$5 and $6</p>\n');
    expect(set('a \\$x$ b').html).toBe('<p>a $x$ b</p>\n');
  });
  test('nothing is woven or emphasised inside', () => {
    expect(set('$a_1 * b =[c, d] * e_2$').html).toContain('data-tex="a_1 * b =[c, d] * e_2"');
  });
});

describe('works cited', () => {
  const list =
    '\n\n```bibtex\n@article{a1, author = {Horn, F. and Jackson, R.}, title = "General <kinetics>", year = 1972}\n```\n';

  test('a key that the text lists reads as authors and year; the list stands where its fence does', () => {
    const { html } = set(`As @[a1] shows.${list}`);
    expect(html).toContain('<span data-cite="a1">Horn, Jackson 1972</span>');
    expect(html).toContain('<li data-entry="a1">Horn F., Jackson R. 1972. General &lt;kinetics&gt;.</li>');
  });

  test('a DOI is a link; a key that another prose may list is left to the page', () => {
    expect(set('See @[10.1000/182; b2].').html).toBe(
      '<p>See <a href="https://doi.org/10.1000/182" rel="noopener noreferrer">doi:10.1000/182</a>; ' +
        '<span data-cite="b2">b2</span>.</p>\n',
    );
  });

  test('BibTeX that cannot be read is an error in its line', () => {
    const error = errorOf(jobOf('prose', 'One.\n\n```bibtex\n@article{a,\n  year = soon\n}\n```\n'));
    expect(error).toMatchObject({ line: 5, message: expect.stringContaining('soon') as unknown });
  });
});

describe('safe HTML', () => {
  test.each([
    '<script>alert(1)</script>',
    '<img src=x onerror=alert(1)>',
    '[x](javascript:alert(1))',
    '[x](vbscript:y)',
    '![x](https://elsewhere.example/a.png)',
    '![x](//elsewhere.example/a.png)',
    '![x](data:image/svg+xml;base64,AAAA)',
    '| a |\n|--:|\n| 1 |',
    '<div style="color:red">x</div>',
    '$"><img src=x onerror=y>$',
    '```"onload=x\ncode\n```',
  ])('%s', (text) => {
    const { html } = set(text);
    expect(html).not.toMatch(/href="(?:javascript|vbscript):/iu);
    const bare = html.replace(/"[^"]*"/gu, '""');
    expect(bare).not.toMatch(/<(?:script|img|div)|<[^>]*\s(?:style|on\w+)=/iu);
  });
  test('a column set right has a class in place of a style', () => {
    expect(set('| a |\n|--:|\n| 1 |').html).toContain('<th class="align-right">');
  });
  test('uploaded pictures stay pictures', () => {
    expect(set('![Flask](/api/pictures/1)').html).toBe('<p><img src="/api/pictures/1" alt="Flask"></p>\n');
  });
  test('references to cells are left to the page', () => {
    expect(set('see [](#run1)').html).toBe('<p>see <a href="#run1" data-reference="run1"></a></p>\n');
  });
});

test('headings are listed', () => {
  expect(set('# A $x$ and =[shape.counts.deficiency]\n\n## *B*').headings).toEqual([
    { level: 1, text: 'A x and 1' },
    { level: 2, text: 'B' },
  ]);
});

test('unclosed signs by the hundred thousand cost no more than their number', () => {
  const { html } = set('$a =[b `c '.repeat(100_000));
  expect(html.length).toBeGreaterThan(1_000_000);
});
