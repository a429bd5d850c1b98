import type { CellKind } from '@stillroom/shared/cells';

/** A cell of an outline, and what is said of it while it is shown in pencil. */
export interface OutlineCell {
  readonly kind: CellKind;
  readonly name: string;
  readonly text: string;
  readonly settings: Readonly<Record<string, unknown>>;
  readonly says: string;
}

export interface Outline {
  readonly title: string;
  readonly kinds: string;
  readonly forWhat: string;
  readonly cells: readonly OutlineCell[];
}

const prose = (text: string, says: string): OutlineCell => ({
  kind: 'prose',
  name: '',
  text,
  settings: {},
  says,
});
const network = (name: string, text: string): OutlineCell => ({
  kind: 'network',
  name,
  text,
  settings: {},
  says: '',
});
const on = (kind: CellKind, name: string, settings: Record<string, unknown>, says: string): OutlineCell => ({
  kind,
  name,
  text: '',
  settings,
  says,
});
const claim = (name: string, text: string, because: string): OutlineCell => ({
  kind: 'claim',
  name,
  text,
  settings: { because },
  says: '',
});

/** Worked outlines, invented numbers throughout. All of them compute as they stand. */
export const outlines: readonly Outline[] = [
  {
    title: 'Two fates from two starts',
    kinds: 'network, structure, two trajectories, plot, claim',
    forWhat:
      'For asking whether a network can settle in more than one place. Change the reactions first; everything below follows.',
    cells: [
      prose(
        '## The question\n\nWhen can this network settle in two places from the same supply?\n',
        'Two sentences: what may happen, and what would settle it.',
      ),
      network(
        'switch',
        '# One species that feeds on itself\n0 <=> X     | af = 0.6 uM/s, ar = 1.1 /s       | turnover\n2 X <=> 3 X | bf = 0.6 /uM/s, br = 0.1 /uM^2/s | growth\n',
      ),
      on(
        'structure',
        'shape',
        { network: 'switch' },
        'Deficiency, linkage classes, conservation laws, verdicts.',
      ),
      on('trajectory', 'low', { network: 'switch', until: 60, start: { X: 1.8 } }, 'From 1.8 it falls to 1.'),
      on(
        'trajectory',
        'high',
        { network: 'switch', until: 60, start: { X: 2.2 } },
        'From 2.2 it climbs to 3.',
      ),
      on(
        'plot',
        'fates',
        {
          mark: 'line',
          draw: [
            { cell: 'low', x: 'times', y: ['species.X'], label: 'from 1.8' },
            { cell: 'high', x: 'times', y: ['species.X'], label: 'from 2.2' },
          ],
          caption: 'Two starts close together end far apart.',
        },
        'Both courses in one picture.',
      ),
      claim(
        'apart',
        'last(high.species.X) - last(low.species.X) > 1.5',
        'The two starts end in different places.',
      ),
      prose(
        '## What we would test\n\nName the measurement that would change your mind.\n',
        'Name the measurement that would change your mind.',
      ),
    ],
  },
  {
    title: 'One network, all its theorems',
    kinds: 'network, structure, balance, two claims',
    forWhat: 'For stating what the structure alone guarantees, before any constant is measured.',
    cells: [
      prose('## What holds for every choice of constants\n\n', 'What is claimed, and for whom it matters.'),
      network('enzyme', '# An enzyme and its substrate\nE + S <=> ES | kf, kr\nES <=> E + P | kc, kq\n'),
      on('structure', 'shape', { network: 'enzyme' }, 'Every verdict with its witnesses.'),
      on('balance', 'even', { network: 'enzyme' }, 'The conditions on the constants.'),
      claim('zero', 'shape.counts.deficiency == 0', 'The deficiency is zero.'),
      claim('laws', 'count(shape.conservationLaws) == 2', 'Enzyme and substrate are both conserved.'),
    ],
  },
  {
    title: 'An outbreak that comes back',
    kinds: 'SIRS: network, trajectory, claim',
    forWhat: 'For people who fall ill, recover, and lose their immunity again.',
    cells: [
      prose('## The outbreak\n\nInvented numbers.\n', 'Where, when, and what is counted.'),
      network(
        'ferry',
        '# Susceptible, infected, recovered, susceptible again; time in days\nS + I -> 2 I | beta = 0.0006 | infection\nI -> R       | gamma = 0.2   | recovery\nR -> S       | omega = 0.01  | waning\nstart S = 990, I = 10\n',
      ),
      on('structure', 'shape', { network: 'ferry' }, 'People are conserved.'),
      on('trajectory', 'course', { network: 'ferry', until: 300 }, 'A first wave, then smaller ones.'),
      claim('endemic', 'last(course.species.I) > 1', 'The infection does not die out.'),
    ],
  },
];
