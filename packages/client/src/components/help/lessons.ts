/** One idea of the notation: a living example, and what to know about it. */
export interface NotationLesson {
  readonly id: string;
  readonly title: string;
  readonly example: string;
  readonly say: string;
}

/** The notation in the order in which it is learned; every example is ours and its numbers are invented. */
export const notationLessons: readonly NotationLesson[] = [
  {
    id: 'first-row',
    title: 'Your first row',
    example: 'E + S <=> ES -> E + P | kf = 0.1 /uM/s, kr = 2 /s, kc = 1.5 /s | binding, then turnover',
    say: 'A chain gives its constants in the order of its arrows; a double arrow takes two, forward first.',
  },
  {
    id: 'sides',
    title: 'Arrows and sides',
    example: '0 <=> S    | feed = 0.3 uM/s, wash = 0.05 /s\n2 X -> 3 X | b = 0.1 /uM/s\nP -> 0     | wash',
    say:
      '`->` goes one way, `<-` the other, `<=>` both. `0` is nothing: supply or loss. A number before a species counts it. ' +
      'A constant gets its value once and may be used again by name.',
  },
  {
    id: 'units',
    title: 'Constants and units',
    example: 'D + E <=> DE | kf = 0.1 /uM/s, kr = 120 /min | binding\nstart D = 60 uM, E = 1200 nM',
    say:
      'A unit stands after its number: products of `s`, `min`, `h`, `d`, `mol`, `M`, `L`, `molecules`, `cells` and others, with prefixes ' +
      'and powers. The first time and amount of the text are those of its results. Rates are checked against the ' +
      'order of their reaction.',
  },
  {
    id: 'laws',
    title: 'Rates of your own',
    example: 'S -> P | law = Vmax*S/(Km + S), Vmax = 3 uM/s, Km = 12 uM | saturates',
    say:
      'Without `law` a row follows mass action. Theorems that need mass action say that they do not apply to a law. ' +
      '`net = …` gives one law for both ways of a double arrow.',
  },
  {
    id: 'statements',
    title: 'Start, let, fix',
    example:
      'A + X -> 2 X | k = 0.2 /uM/s\nX -> 0      | d = 0.1 /s\nfix A = 1 uM\nstart X = 0.01 uM\nlet total = A + X',
    say:
      '`start` gives what is there at first, 0 where silent. `fix` holds a species constant and strikes it from every ' +
      'complex. `let` names a constant, or an output made of species and `t`.',
  },
  {
    id: 'families',
    title: 'Families',
    example:
      'let L = 6, b = 4\n[i = 1..L] X[i] <=> X[i % L + 1] | p = 1, p\nweight X[i] = 1 + b/n for i = 1..L\nstart X[i] = 4 for i = 1..L',
    say:
      'One row stands for every index. `weight` says how fast a site that holds `n` loses one, in place of `n`; it touches counts ' +
      'only. `where` keeps some of the indices.',
  },
  {
    id: 'events',
    title: 'Volumes, events, rates',
    example: 'A -> B | k = 0.3 /s\nvolume V = 1 fL\nstart A = 2 uM\nevent when t >= 5: A = 2',
    say:
      '`volume` turns concentrations into counts. `event` sets values when its condition turns true. `rate X = …` lets X ' +
      'follow an equation of its own.',
  },
  {
    id: 'faults',
    title: 'When it cannot be read',
    example: 'D + E <=> DE | kf = 0.1 /uM/s, kr = 2 | binding\nDE -> N + E | kc = 0.5 /s',
    say:
      'What was found, what was expected, what to do. One fault never hides the next, and the rest of the network is ' +
      'read all the same.',
  },
];
