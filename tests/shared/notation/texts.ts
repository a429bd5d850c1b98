import fc from 'fast-check';

/**
 * Random network texts with random blanks, Unicode signs, comments and notes: what people may type for what the grammar
 * allows. A text is built as words, then spaced at random, so that printing has something to straighten out.
 */

const speciesName = fc.constantFrom('A', 'B', 'C1', 'ES', "X'", 'α', 'Signal_2', 'M', 'Ångström');
const constantName = fc.constantFrom('kf', 'kr', 'κ', 'k_cat', 'wash', "p'");
const index = fc.constantFrom('i', 'i+1', 'i % 4 + 1', '2*i - 1', '3', 'max(i, 2)', '(i + 1) % 3');
const number = fc.constantFrom('0', '1', '2.50', '1e-3', '0.1', '12E4', '3', '.5');
const unit = fc.constantFrom(
  '/s',
  '/uM/s',
  'µM',
  'uM^-1 s^-1',
  '1/h',
  'mol/L',
  'mL/cells/d',
  'um^3',
  'molecules',
);
const blank = fc.constantFrom('', ' ', '  ', '\t', ' \\\n  ');
const space = fc.constantFrom(' ', '  ', '\t ');

const joined = (parts: readonly fc.Arbitrary<string>[]): fc.Arbitrary<string> =>
  fc.tuple(...parts).map((texts) => texts.join(''));
const text = (value: string) => fc.constant(value);
const listed = (item: fc.Arbitrary<string>, least: number, most: number, separator: fc.Arbitrary<string>) =>
  fc
    .tuple(
      fc.array(item, { minLength: least, maxLength: most }),
      fc.array(separator, { minLength: most, maxLength: most }),
    )
    .map(([items, separators]) =>
      items.map((each, i) => (i === 0 ? each : `${separators[i]}${each}`)).join(''),
    );
const comma = joined([blank, text(','), blank]);

const indexed = (name: fc.Arbitrary<string>) =>
  fc.oneof(
    { weight: 3, arbitrary: name },
    { weight: 1, arbitrary: joined([name, text('['), listed(index, 1, 2, comma), text(']')]) },
  );

/** Expressions of all operators, with brackets that may be needless. */
export const expression: fc.Arbitrary<string> = fc.letrec<{ e: string }>((tie) => ({
  e: fc.oneof(
    { maxDepth: 5, withCrossShrink: true },
    number,
    indexed(constantName),
    indexed(speciesName),
    text('t'),
    joined([number, space, unit]),
    joined([text('('), blank, tie('e'), blank, text(')')]),
    joined([text('('), tie('e'), text(')'), space, unit]),
    joined([tie('e'), space, fc.constantFrom('+', '-', '*', '/', '%', '−', '·'), space, tie('e')]),
    joined([
      text('('),
      tie('e'),
      fc.constantFrom('==', '!=', '<', '<=', ' > ', '≥'),
      space,
      tie('e'),
      text(')'),
    ]),
    joined([text('('), tie('e'), fc.constantFrom(' and ', ' or '), tie('e'), text(')')]),
    joined([text('(not '), tie('e'), text(')')]),
    joined([text('('), tie('e'), text(')^'), fc.constantFrom('2', '-3', '(1/2)', 'kf')]),
    joined([text('-'), tie('e')]),
    joined([fc.constantFrom('exp', 'ln', 'sqrt', 'tanh'), text('('), tie('e'), text(')')]),
    joined([text('min('), tie('e'), comma, tie('e'), text(')')]),
    joined([text('if('), tie('e'), comma, tie('e'), comma, tie('e'), text(')')]),
    joined([text('sum(i = 1..3, '), tie('e'), text(')')]),
  ),
})).e;

const coefficient = fc.constantFrom('', '', '', '2', '2 ', '0.5 ', '3/2 ', '12 ');
const term = joined([coefficient, indexed(speciesName)]);
const side = fc.oneof(
  { weight: 1, arbitrary: fc.constantFrom('0', '∅') },
  { weight: 5, arbitrary: listed(term, 1, 3, joined([blank, text('+'), blank])) },
);
const arrow = joined([space, fc.constantFrom('->', '<-', '<=>', '→', '←', '⇌'), blank]);
const reaction = fc
  .tuple(side, fc.array(fc.tuple(arrow, side), { minLength: 1, maxLength: 3 }))
  .map(([first, rest]) => first + rest.map(([sign, next]) => sign + next).join(''));

const range = fc.constantFrom('i = 1..4', 'i=1..L', 'i = 1 .. 2*L - 1', 'i = (L + 1)/2..9');
const where = fc.constantFrom('', ' where i % 2 == 0', ' where i != 3 and (i > 1 or i == L)');
const familyWords = fc
  .tuple(range, fc.constantFrom('', ', j = i+1..5'), where)
  .map((parts) => parts.join(''));

const value = fc.oneof(
  number,
  joined([number, space, unit]),
  joined([text('('), expression, text(')'), space, unit]),
  expression,
);
const item = fc.oneof(
  indexed(constantName),
  joined([indexed(constantName), blank, text('='), blank, value]),
  value.filter((written) => !/^\s*[\p{L}]/u.test(written)),
  joined([fc.constantFrom('law', 'net'), blank, text('='), blank, expression]),
);
const note = fc.constantFrom('', 'binding', 'after  Haldane | 1930', 'ein Wort, noch eins', '=> see 3.2');
const row = fc
  .tuple(fc.option(familyWords), reaction, listed(item, 0, 3, comma), note, blank)
  .map(([family, words, items, noted, gap]) => {
    const head = family === null ? words : `[${family}]${gap}${words}`;
    if (noted !== '') return `${head}${gap}|${gap}${items}${gap}|${gap}${noted}`;
    return items === '' ? head : `${head}${gap}| ${items}`;
  });

const forClause = fc.option(familyWords).map((family) => (family === null ? '' : ` for ${family}`));
const assignment = (name: fc.Arbitrary<string>, after = '') =>
  fc
    .tuple(indexed(name), blank, value, forClause)
    .map(([target, gap, given, family]) => `${target}${gap}=${gap}${given}${after}${family}`);
const statement = fc.oneof(
  ...(['start', 'fix', 'rate'] as const).map((word) =>
    joined([text(word), space, listed(assignment(speciesName), 1, 3, comma)]),
  ),
  joined([text('let '), listed(assignment(constantName), 1, 2, comma)]),
  joined([text('volume '), assignment(constantName)]),
  joined([text('weight '), assignment(speciesName, ' in n')]),
  joined([text('in '), constantName, blank, text(':'), listed(indexed(speciesName), 1, 3, comma)]),
  joined([text('event when '), expression, blank, text(':'), space, assignment(speciesName)]),
);

const comment = fc.constantFrom('', '', '', ' # why', '#', '  #  spaced  ', '# a | b \\ c');
const line = fc
  .tuple(
    fc.oneof(
      { weight: 5, arbitrary: row },
      { weight: 3, arbitrary: statement },
      { weight: 1, arbitrary: blank.filter((b) => !b.includes('\n')) },
    ),
    comment,
  )
  .map((parts) => parts.join(''));

/** Texts without syntax errors; what they say may make no sense. */
export const networkText: fc.Arbitrary<string> = fc
  .tuple(fc.array(line, { maxLength: 8 }), fc.constantFrom('\n', '\r\n'), fc.boolean())
  .map(([lines, newline, last]) => lines.join(newline) + (last && lines.length > 0 ? newline : ''));

/** Anything at all, rich in what means something. */
export const anyText: fc.Arbitrary<string> = fc
  .array(
    fc.oneof(
      fc.constantFrom(
        'A',
        '->',
        '<=>',
        '|',
        '#',
        '\\',
        '\n',
        '[',
        ']',
        '(',
        ')',
        ',',
        '=',
        '1',
        '2.5',
        'e9',
        'uM',
        '/s',
        ' ',
        '..',
      ),
      fc.constantFrom(
        'let ',
        'start ',
        'event when ',
        'weight ',
        'in n',
        'for ',
        'where ',
        'law',
        'sum(',
        'if(',
        '^',
        '%',
        '\0',
        '\ud800',
        '😀',
      ),
      fc.string({ maxLength: 3, unit: 'binary' }),
    ),
    { maxLength: 40 },
  )
  .map((parts) => parts.join(''));

/** A fixed seed, so that a failure can be had again. */
export const seeded = { seed: 20261201, numRuns: 400 } as const;
