import type { Expression } from '../../expression/expression.ts';
import type { ExpressionSyntax } from '../../expression/syntax.ts';
import type { RateLaw } from '../../network/network.ts';
import type { Elaboration } from './stage.ts';
import type { NameTable } from './name-table.ts';
import type { LawJob } from './rows.ts';
import { outermost } from './scope.ts';

const zeroLaw: RateLaw = {
  expression: { kind: 'number', value: 0, text: '0' },
  net: false,
  massAction: null,
};

/** Resolves the laws of rows; `lawOf` holds the law of each reaction, -1 for mass action. */
export function resolveLaws(stage: Elaboration): { laws: RateLaw[]; lawOf: Int32Array } {
  const { rows, resolver, complaints } = stage;
  const lawOf = new Int32Array(rows.count).fill(-1);
  const laws: RateLaw[] = [];
  const recognise = massActionRecogniser(stage);
  // A law that fails for one member of a family is told once.
  const failed = new Set<ExpressionSyntax>();
  for (const job of rows.laws) {
    if (failed.has(job.syntax)) continue;
    try {
      const expression = resolver.resolve(job.syntax, job.scope);
      lawOf[job.reaction] = laws.length;
      laws.push({ expression, net: job.net, massAction: job.net ? null : recognise(job, expression) });
    } catch (thrown) {
      complaints.failure(thrown);
      failed.add(job.syntax);
    }
  }
  if (rows.zeroLawReactions.length > 0) {
    for (const reaction of rows.zeroLawReactions) lawOf[reaction] = laws.length;
    laws.push(zeroLaw);
  }
  return { laws, lawOf };
}

/** A product as powers of names and a list of numbers. */
interface Product {
  readonly powers: Map<string, number>;
  readonly numbers: (Expression & { kind: 'number' })[];
}

/**
 * Finds the constant of a law that is one constant (or one number, which then is a constant named after its arrow)
 * times the powers of the reactants.
 */
function massActionRecogniser(stage: Elaboration): (job: LawJob, law: Expression) => number | null {
  let species: Map<string, number> | null = null;
  let constants: Map<string, number> | null = null;
  return (job, law) => {
    const product: Product = { powers: new Map(), numbers: [] };
    if (!gather(law, 1, product)) return null;
    species ??= numbersOf(stage.species);
    constants ??= numbersOf(stage.constants);
    const reactant = stage.rows.reactantOf(job.reaction);
    const rest = new Map(product.powers);
    for (const { species: number, coefficient } of reactant) {
      const name = stage.species.nameOf(number);
      if (rest.get(name) !== coefficient) return null;
      rest.delete(name);
    }
    const [only, ...others] = rest;
    if (others.length > 0) return null;
    if (only && product.numbers.length === 0) return only[1] === 1 ? (constants.get(only[0]) ?? null) : null;
    const [number] = product.numbers;
    return !only && number && product.numbers.length === 1 ? constantForNumber(stage, job, number) : null;
  };
}

/** Gathers the factors of a product of names, numbers and integer powers; false where it is none. */
function gather(expression: Expression, exponent: number, into: Product): boolean {
  if (expression.kind === 'name') {
    into.powers.set(expression.name, (into.powers.get(expression.name) ?? 0) + exponent);
    return true;
  }
  if (expression.kind === 'number') {
    if (exponent !== 1) return false;
    into.numbers.push(expression);
    return true;
  }
  if (expression.kind !== 'binary') return false;
  if (expression.operator === '*') {
    return gather(expression.left, exponent, into) && gather(expression.right, exponent, into);
  }
  const { left, right } = expression;
  return (
    expression.operator === '^' &&
    right.kind === 'number' &&
    right.value > 0 &&
    gather(left, exponent * right.value, into)
  );
}

function constantForNumber(
  stage: Elaboration,
  job: LawJob,
  number: Expression & { kind: 'number' },
): number | null {
  const name = `k${job.arrow}`;
  if (stage.declarations.kindOf(name) !== null || number.value < 0) return null;
  const text = number.text ?? String(number.value);
  const known = stage.values.definition(name)?.value;
  if (known && !(known.kind === 'number' && known.text === text)) return null;
  const at = { from: job.syntax.from, to: job.syntax.to };
  if (!known) {
    const definition = {
      value: { kind: 'number' as const, text, ...at },
      scope: outermost,
      at,
      line: job.line,
    };
    stage.values.define(name, definition);
  }
  return stage.constants.intern(stage.constants.base(name), []);
}

function numbersOf(table: NameTable): Map<string, number> {
  const numbers = new Map<string, number>();
  for (let i = 0; i < table.count; i += 1) numbers.set(table.nameOf(i), i);
  return numbers;
}
