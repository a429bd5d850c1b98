import type { Expression } from '@stillroom/shared/expression';
import type { Network } from '@stillroom/shared/network';

/** How an expression behaves on states that are nowhere negative, constants being positive. */
interface Shape {
  /** Positive exactly when all of these species are present and 0 otherwise; empty: always positive. */
  readonly positiveWith: ReadonlySet<string>;
  /** Never falls when a species is added. */
  readonly grows: boolean;
  /** Species with which it rises strictly on positive states. */
  readonly rises: ReadonlySet<string>;
  /** Free of species and time. */
  readonly constant: boolean;
}

/** Whether a law is visibly positive exactly when all reactants are present. A "no" means only that it is not visible. */
export function vanishesWithReactants(
  law: Expression,
  reactants: ReadonlySet<string>,
  network: Network,
): boolean {
  const shape = shapeOf(law, movingNames(network));
  return (
    shape !== null &&
    shape.positiveWith.size === reactants.size &&
    [...reactants].every((name) => shape.positiveWith.has(name))
  );
}

/** Whether a law visibly depends on its reactants only and never falls when one is added. */
export function growsWithReactants(
  law: Expression,
  reactants: ReadonlySet<string>,
  network: Network,
): boolean {
  const shape = shapeOf(law, movingNames(network));
  if (shape === null || !shape.grows) return false;
  return namesIn(law).every((name) => reactants.has(name) || !movingNames(network).has(name));
}

/** Whether a law visibly rises strictly with each reactant on positive states and never falls. */
export function risesWithReactants(
  law: Expression,
  reactants: ReadonlySet<string>,
  network: Network,
): boolean {
  const shape = shapeOf(law, movingNames(network));
  if (shape === null || !growsWithReactants(law, reactants, network)) return false;
  return [...reactants].every((name) => shape.rises.has(name));
}

function movingNames(network: Network): ReadonlySet<string> {
  const names = new Set(network.species.filter((_, i) => !network.fixed.has(i)));
  for (const output of network.outputs) names.add(output.name);
  return names.add('t');
}

function shapeOf(expression: Expression, moving: ReadonlySet<string>): Shape | null {
  switch (expression.kind) {
    case 'number':
      return expression.value > 0 ? positiveConstant : null;
    case 'name':
      if (!moving.has(expression.name)) return positiveConstant;
      return expression.name === 't'
        ? null
        : {
            positiveWith: new Set([expression.name]),
            grows: true,
            rises: new Set([expression.name]),
            constant: false,
          };
    case 'binary':
      return binaryShape(expression, moving);
    case 'call':
      return callShape(expression, moving);
    default:
      return null;
  }
}

const positiveConstant: Shape = { positiveWith: new Set(), grows: true, rises: new Set(), constant: true };

function binaryShape(
  expression: Extract<Expression, { kind: 'binary' }>,
  moving: ReadonlySet<string>,
): Shape | null {
  const left = shapeOf(expression.left, moving);
  const right = shapeOf(expression.right, moving);
  if (left === null || right === null) return null;
  const constant = left.constant && right.constant;
  const grows = left.grows && right.grows;
  const rises = new Set([...left.rises, ...right.rises]);
  switch (expression.operator) {
    case '*':
      return { positiveWith: new Set([...left.positiveWith, ...right.positiveWith]), grows, rises, constant };
    case '+':
      if (left.positiveWith.size === 0 || right.positiveWith.size === 0)
        return { positiveWith: new Set(), grows, rises, constant };
      return sameSet(left.positiveWith, right.positiveWith)
        ? { positiveWith: left.positiveWith, grows, rises, constant }
        : null;
    case '/':
      if (right.positiveWith.size > 0) return null;
      return {
        positiveWith: left.positiveWith,
        grows: left.grows && (right.constant || saturates(expression.left, expression.right, moving)),
        rises: left.rises,
        constant,
      };
    case '^':
      return right.constant && right.positiveWith.size === 0 ? { ...left, constant } : null;
    default:
      return null;
  }
}

function callShape(
  expression: Extract<Expression, { kind: 'call' }>,
  moving: ReadonlySet<string>,
): Shape | null {
  const parts = expression.arguments.map((part) => shapeOf(part, moving));
  const [first, ...rest] = parts;
  if (first === undefined || first === null) return null;
  if (expression.name === 'hill') return rest.every((part) => part?.constant) ? first : null;
  if (expression.name === 'sqrt') return first;
  if (expression.name === 'min' && rest.every((part) => part !== null)) {
    const all = parts as Shape[];
    return {
      positiveWith: new Set(all.flatMap((part) => [...part.positiveWith])),
      grows: all.every((part) => part.grows),
      rises: new Set(),
      constant: all.every((part) => part.constant),
    };
  }
  return null;
}

/** f/(c + f) or c·f/(c' + f) with the same f, which grows with f: the law of Michaelis and Menten, of Hill, of Monod. */
function saturates(above: Expression, below: Expression, moving: ReadonlySet<string>): boolean {
  if (below.kind !== 'binary' || below.operator !== '+') return false;
  const isConstant = (part: Expression): boolean => shapeOf(part, moving)?.constant ?? false;
  const [constant, growing] = isConstant(below.left) ? [below.left, below.right] : [below.right, below.left];
  if (!isConstant(constant)) return false;
  const factors = factorsOf(above);
  const wanted = factorsOf(growing)
    .filter((factor) => !isConstant(factor))
    .map(keyOf);
  const rest = factors.filter((factor) => !isConstant(factor)).map(keyOf);
  return wanted.every((key) => {
    const at = rest.indexOf(key);
    if (at < 0) return false;
    rest.splice(at, 1);
    return true;
  });
}

function factorsOf(expression: Expression): Expression[] {
  return expression.kind === 'binary' && expression.operator === '*'
    ? [...factorsOf(expression.left), ...factorsOf(expression.right)]
    : [expression];
}

function keyOf(expression: Expression): string {
  return JSON.stringify(expression);
}

function sameSet(a: ReadonlySet<string>, b: ReadonlySet<string>): boolean {
  return a.size === b.size && [...a].every((name) => b.has(name));
}

function namesIn(expression: Expression): string[] {
  switch (expression.kind) {
    case 'number':
      return [];
    case 'name':
      return [expression.name];
    case 'negate':
    case 'not':
      return namesIn(expression.of);
    case 'call':
      return expression.arguments.flatMap(namesIn);
    default:
      return [...namesIn(expression.left), ...namesIn(expression.right)];
  }
}
