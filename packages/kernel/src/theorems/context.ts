import type { Verdict, VerdictId, WitnessNumber } from '@stillroom/shared/cells';
import type { Network } from '@stillroom/shared/network';
import type { IntegerMatrix, Rational, SparseVector } from '../exact/index.ts';
import {
  integerForResult,
  integerKernel,
  lcm,
  matrixFrom,
  matrixOfRows,
  primitive,
  rightNullspace,
  toDouble,
  transpose,
  ZERO,
} from '../exact/index.ts';
import type { StructuralNetwork } from '../network/index.ts';
import { complexLabel, structuralNetwork } from '../network/index.ts';
import type { Structure } from '../structure/index.ts';
import { analyse, membersOf, nonterminalComplexes } from '../structure/index.ts';
import type { ArrowConstants } from './arrow-constants.ts';
import { arrowConstants, unreadConstants } from './arrow-constants.ts';
import { positiveCirculation } from './circulation.ts';
import type { Term } from './coefficients.ts';
import { Coefficients } from './coefficients.ts';
import type { KineticsReport } from './kinetics.ts';
import { reportKinetics } from './kinetics.ts';
import type { Conservation, Consistency } from './positive-vectors.ts';
import { decideConservation, decideConsistency } from './positive-vectors.ts';

/** One distinct directed arrow between complexes. */
export interface Arrow {
  readonly from: number;
  readonly to: number;
}

/** A linkage class; its deficiency is null where the rank could not be proven. */
export interface LinkageClass {
  readonly complexes: readonly number[];
  readonly deficiency: number | null;
  readonly terminalStrongClasses: readonly (readonly number[])[];
}

/** Entries (species × arrows) above which dense exact matrices are not formed; theorems that need them stay undecided. */
export const DENSE_LIMIT = 250_000;

/** Arrows above which witnesses that name every arrow are left out and constants are not read. */
const HUGE = 50_000;

/** Judges a theorem by its name on a context, so that verdicts can build on each other. */
export type JudgeById = (id: VerdictId, context: TheoremContext) => Verdict;

/**
 * What theorems look at: one network with its structural quantities, each computed when first asked for and once.
 * Complexes, arrows and species are those of the structural network (`fix` applied, equal arrows merged).
 */
export class TheoremContext {
  readonly network: Network;
  /** The structural network. */
  readonly structure: StructuralNetwork;
  /** Its structural quantities. */
  readonly analysis: Structure;
  readonly species: readonly string[];
  readonly #judge: JudgeById;
  readonly #kept = new Map<string, unknown>();

  constructor(network: Network, judge: JudgeById, analysis: Structure) {
    const structure = analysis.network;
    this.network = network;
    this.analysis = analysis;
    this.structure = structure;
    this.#judge = judge;
    this.species = structure.species;
  }

  /** Distinct arrows in order of writing. */
  get arrows(): readonly Arrow[] {
    return this.memo('arrows', () => {
      const { count, from, to } = this.structure.arrows;
      return Array.from({ length: count }, (_, arrow) => ({ from: from[arrow]!, to: to[arrow]! }));
    });
  }

  /** Whether the network is beyond what is looked at arrow by arrow; only structural quantities are used then. */
  get huge(): boolean {
    return this.structure.arrows.count > HUGE;
  }

  /** The value of `compute`, kept under a name for the life of the context. */
  memo<T>(name: string, compute: () => T): T {
    if (!this.#kept.has(name)) this.#kept.set(name, compute());
    return this.#kept.get(name) as T;
  }

  /** The same network with mass action everywhere and the constants given by arrow; `fix` and weights set aside. */
  withMassAction(constants: readonly Rational[]): TheoremContext {
    const { network, structure } = this;
    const values = Array.from({ length: network.reactions.count }, () => ZERO);
    constants.forEach(
      (value, arrow) => (values[structure.reactions.source[this.reactionOf(arrow)]!] = value),
    );
    const plain: Network = {
      ...network,
      constants: values.map((exact, i) => ({
        name: `v${i + 1}`,
        quantity: { value: toDouble(exact), exact },
        unit: null,
        line: 0,
      })),
      reactions: {
        ...network.reactions,
        constant: Int32Array.from(values, (_, i) => i),
        law: new Int32Array(values.length).fill(-1),
      },
      laws: [],
      weights: new Map(),
    };
    return new TheoremContext(plain, this.#judge, analyse(structuralNetwork(plain)));
  }

  /** The verdict of another theorem. */
  verdict(id: VerdictId): Verdict {
    return this.memo(`verdict ${id}`, () => this.#judge(id, this));
  }

  get complexCount(): number {
    return this.structure.complexes.count;
  }

  complexLabel(complex: number): string {
    return complexLabel(this.species, this.structure.complexes, complex);
  }

  /** "A + B -> 2 B". */
  arrowLabel(arrow: number): string {
    const { from, to } = this.arrows[arrow]!;
    return `${this.complexLabel(from)} -> ${this.complexLabel(to)}`;
  }

  /** The first written reaction (index of the structure result) that states an arrow. */
  reactionOf(arrow: number): number {
    return this.structure.arrows.reaction[arrow]!;
  }

  speciesNames(species: readonly number[]): string[] {
    return species.map((i) => this.species[i]!);
  }

  /** Whether every coefficient is a whole number. */
  get whole(): boolean {
    return this.structure.complexes.denominators?.every((denominator) => denominator === 1) ?? true;
  }

  /** The largest coefficient of a species in a complex. */
  get highestCoefficient(): number {
    const { numerators, denominators } = this.structure.complexes;
    return numerators.reduce((most, value, k) => Math.max(most, value / (denominators?.[k] ?? 1)), 0);
  }

  get coefficients(): Coefficients {
    return this.memo('coefficients', () => new Coefficients(this.structure));
  }

  /** The species of a complex with their coefficients, ascending by species. */
  terms(complex: number): readonly Term[] {
    return this.coefficients.terms(complex);
  }

  coefficient(complex: number, species: number): number {
    return this.terms(complex).find((term) => term.species === species)?.coefficient ?? 0;
  }

  /** Null where the rank could not be proven. */
  get deficiency(): number | null {
    return this.analysis.deficiency;
  }

  get rank(): number | null {
    return this.analysis.rank;
  }

  get linkageClasses(): readonly LinkageClass[] {
    return this.memo('linkage classes', () => {
      const { linkage, strong, terminal, classes } = this.analysis;
      const terminalClasses: number[][][] = Array.from({ length: linkage.count }, () => []);
      for (let group = 0; group < strong.count; group++) {
        if (terminal[group] === 0) continue;
        const members = Array.from(membersOf(strong, group));
        terminalClasses[linkage.of[members[0]!]!]!.push(members);
      }
      return terminalClasses.map((terminalStrongClasses, group) => ({
        complexes: Array.from(membersOf(linkage, group)),
        deficiency: classes[group]!.deficiency,
        terminalStrongClasses,
      }));
    });
  }

  /** Linkage class of each complex. */
  get linkageClassOf(): Int32Array {
    return this.analysis.linkage.of;
  }

  get nonterminalComplexes(): readonly number[] {
    return this.memo('non-terminal complexes', () =>
      Array.from(nonterminalComplexes(this.analysis.strong, this.analysis.terminal)),
    );
  }

  /** An arrow that lies on no directed cycle, or null in a weakly reversible network. */
  get oneWayArrow(): number | null {
    return this.memo('one-way arrow', () => {
      const strong = this.analysis.strong.of;
      const { from, to, count } = this.structure.arrows;
      for (let arrow = 0; arrow < count; arrow++)
        if (strong[from[arrow]!] !== strong[to[arrow]!]) return arrow;
      return null;
    });
  }

  get weaklyReversible(): boolean {
    return this.oneWayArrow === null;
  }

  get arrowWithoutReverse(): number | null {
    const arrow = this.structure.arrows.reverse.indexOf(-1);
    return arrow < 0 ? null : arrow;
  }

  /** A positive flux on all arrows that leaves every complex balanced, for a weakly reversible network. */
  get circulation(): readonly bigint[] | null {
    return this.memo('circulation', () =>
      this.weaklyReversible && !this.huge ? positiveCirculation(this.complexCount, this.arrows) : null,
    );
  }

  /** Whether dense exact matrices of this network are affordable. */
  get dense(): boolean {
    return this.species.length * Math.max(1, this.structure.arrows.count) <= DENSE_LIMIT;
  }

  /** Null where the network is too large for the exact test. */
  get consistency(): Consistency | null {
    return this.memo('consistency', () => (this.huge ? null : decideConsistency(this)));
  }

  /** Null where the network is too large for the exact test. */
  get conservation(): Conservation | null {
    return this.memo('conservation', () => (this.huge ? null : decideConservation(this)));
  }

  /** N with each species in the unit that makes its coefficients integers; species × arrows. Only where `dense`. */
  get stoichiometricMatrix(): IntegerMatrix {
    return this.memo('N', () =>
      matrixFrom(this.species.length, this.arrows.length, (i, arrow) => {
        const { from, to } = this.arrows[arrow]!;
        return this.coefficients.scaled(to, i) - this.coefficients.scaled(from, i);
      }),
    );
  }

  /** A basis of the conservation laws on scaled amounts, non-negative ones first, by species. Only where `dense`. */
  get lawBasis(): bigint[][] {
    return this.memo('law basis', () => integerKernel(transpose(this.stoichiometricMatrix)));
  }

  /** A basis of the kernel of N, by arrow. Only where `dense`. */
  get kernelBasis(): bigint[][] {
    return this.memo('kernel basis', () => rightNullspace(this.stoichiometricMatrix));
  }

  /**
   * A lattice basis of ker Y ∩ im I_a ∩ Z^n, one vector by complex for each unit of deficiency; null where too large.
   */
  get deficiencyVectors(): bigint[][] | null {
    return this.memo('deficiency vectors', () => {
      if (this.deficiency === 0) return [];
      const classes = this.linkageClasses;
      if ((this.species.length + classes.length) * this.complexCount > DENSE_LIMIT / 5) return null;
      const rows = this.species.map((_, i) =>
        Array.from({ length: this.complexCount }, (_unused, y) => this.coefficients.scaled(y, i)),
      );
      for (const { complexes } of classes) {
        const members = new Set(complexes);
        rows.push(Array.from({ length: this.complexCount }, (_unused, y) => (members.has(y) ? 1n : 0n)));
      }
      return integerKernel(matrixOfRows(rows, this.complexCount));
    });
  }

  get kinetics(): KineticsReport {
    return this.memo('kinetics', () => reportKinetics(this.structure));
  }

  /** The constant of every arrow, its equal rows and fixed species included. */
  get constants(): ArrowConstants {
    return this.memo('constants', () => (this.huge ? unreadConstants : arrowConstants(this.structure)));
  }

  /** Positive exact constants by arrow, or null where one is missing, zero or not rational. */
  get exactConstants(): readonly Rational[] | null {
    return this.constants.exact;
  }

  /** Exact start amounts by species (0 where the text is silent), or null where none is given or one is not rational. */
  get exactStart(): readonly Rational[] | null {
    return this.memo('exact start', () => {
      const { start } = this.network;
      if (start.size === 0) return null;
      const amounts = Array.from(this.structure.sourceSpecies, (i) =>
        start.has(i) ? start.get(i)!.exact : ZERO,
      );
      return amounts.every((amount) => amount !== null) ? amounts : null;
    });
  }

  /** A flux by arrow as witness entries, keyed by reaction index. */
  fluxEntries(flux: readonly bigint[]): Record<string, WitnessNumber> {
    return entriesOf(flux, (arrow) => String(this.reactionOf(arrow)));
  }

  /** A linear function of the species, given by the true coefficients, keyed by species name. */
  lawEntries(law: readonly bigint[]): Record<string, WitnessNumber> {
    return entriesOf(law, (i) => this.species[i]!);
  }

  /** A sparse linear function of the species, keyed by species name. */
  sparseLawEntries({ indices, values }: SparseVector): Record<string, WitnessNumber> {
    const entries: Record<string, WitnessNumber> = {};
    indices.forEach((i, k) => (entries[this.species[i]!] = integerForResult(values[k]!)));
    return entries;
  }

  /** A change of the species given on scaled amounts, up to a positive factor, keyed by species name. */
  changeEntries(change: readonly bigint[]): Record<string, WitnessNumber> {
    const common = this.coefficients.scale.reduce(lcm, 1n);
    const whole = primitive(change.map((value, i) => (value * common) / this.coefficients.scale[i]!));
    return entriesOf(whole, (i) => this.species[i]!);
  }

  /** A vector by complex, keyed by complex index. */
  complexEntries(vector: readonly bigint[]): Record<string, WitnessNumber> {
    return entriesOf(vector, String);
  }
}

function entriesOf(vector: readonly bigint[], key: (index: number) => string): Record<string, WitnessNumber> {
  const entries: Record<string, WitnessNumber> = {};
  vector.forEach((value, index) => {
    if (value !== 0n) entries[key(index)] = integerForResult(value);
  });
  return entries;
}
