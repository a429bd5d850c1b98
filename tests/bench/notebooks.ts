/** Notebooks for measuring, as notebook files; their networks and numbers are made up. */
interface FileCell {
  readonly id: string;
  readonly kind: string;
  readonly name: string;
  readonly text: string;
  readonly settings: Readonly<Record<string, unknown>>;
  readonly held: boolean;
}

const cell = (
  id: string,
  kind: string,
  name: string,
  text: string,
  settings: Readonly<Record<string, unknown>> = {},
): FileCell => ({ id, kind, name, text, settings, held: false });

const file = (title: string, cells: readonly FileCell[]) => ({
  format: 'stillroom-notebook/1',
  title,
  subject: 'none',
  cells,
});

/** Twelve rows whose last one is taken out and put back, a structure and a claim that follow. */
export function typingNotebook() {
  const rows = Array.from(
    { length: 11 },
    (_, i) => `S${i} + E <=> C${i} -> S${i + 1} + E | a${i}, b${i}, c${i}`,
  );
  return file('Typing', [
    cell('c1', 'network', 'chain', [...rows, 'S11 <=> Q'].join('\n')),
    cell('c2', 'structure', 'shape', '', { network: 'chain' }),
    cell('c3', 'claim', 'few', 'shape.counts.deficiency < 100'),
  ]);
}

/** Ten sections of six cells: prose, network, structure, trajectory, claim, prose. */
export function sixtyCells() {
  const section = (k: number): FileCell[] => [
    cell(
      `p${k}`,
      'prose',
      '',
      `# Section ${k}\n\nA loop of size ${k} with $k_{${k}} = ${k}$, deficiency =[shape${k}.counts.deficiency].`,
    ),
    cell(
      `n${k}`,
      'network',
      `net${k}`,
      `A + B <=> C | f = 0.${k}1 /uM/s, r = 2 /s | binding\nC -> A + D | c = 1.5 /s\nD -> B | d = 0.3 /s\nstart A = 1 uM, B = ${k} uM`,
    ),
    cell(`s${k}`, 'structure', `shape${k}`, '', { network: `net${k}` }),
    cell(`t${k}`, 'trajectory', `run${k}`, '', { network: `net${k}`, until: 20 }),
    cell(`c${k}`, 'claim', `claim${k}`, `last(run${k}.species.A) > 0`),
    cell(`q${k}`, 'prose', '', `It ends at =[run${k}.species.A, last, 3 digits] µM.`),
  ];
  return file('Sixty cells', Array.from({ length: 10 }, (_, k) => section(k + 1)).flat());
}

/** Two hundred rows with values, units and notes, and what draws on them: the network one types in. */
export function longNetwork() {
  const rows = Array.from(
    { length: 200 },
    (_, i) =>
      `S${i} + E${i % 7} <=> C${i} -> S${i + 1} + E${i % 7} | a${i} = 0.${i + 1} /uM/s, b${i} = 2 /s, c${i} = 1.5 /s | step ${i}`,
  );
  return file('Two hundred rows', [
    cell('c1', 'network', 'chain', [...rows, 'start S0 = 10 uM, E0 = 1 uM'].join('\n')),
    cell('c2', 'structure', 'shape', '', { network: 'chain' }),
    cell('c3', 'trajectory', 'run', '', { network: 'chain', until: 20 }),
    cell('c4', 'claim', 'few', 'shape.counts.deficiency < 100'),
  ]);
}

/** Twenty sections of five cells: prose, network, structure, trajectory, claim. */
export function hundredCells() {
  const sections = sixtyCells().cells.filter(({ id }) => !id.startsWith('q'));
  const again = sections.map((each) => {
    const renamed = (text: string) => text.replaceAll(/\b(net|shape|run|claim)(\d+)/g, '$1$2b');
    const settings = JSON.parse(renamed(JSON.stringify(each.settings))) as FileCell['settings'];
    return { ...each, id: `${each.id}b`, name: renamed(each.name), text: renamed(each.text), settings };
  });
  return file('A hundred cells', [...sections, ...again]);
}
