import type { Expression } from '@stillroom/shared/expression';
import type { NetworkEvent } from '@stillroom/shared/network';
import type { OdeEvent } from '../ode/index.ts';
import { leavesFunction } from '../ode/index.ts';
import type { Node } from '../program/index.ts';
import type { RateEquations } from './equations.ts';
import { RateError } from './error.ts';
import { expressionNode } from './expression.ts';
import type { NamedNodes } from './system.ts';

/** Events as the solver wants them, and the functions that they need of the system. */
export interface CompiledEvents {
  readonly events: readonly OdeEvent[];
  readonly functions: readonly NamedNodes[];
}

type Truth = (signs: Int8Array) => boolean;

/**
 * Splits the condition of each event into leaves (differences of the two sides of its comparisons) and their logic,
 * so that the moment at which it turns true can be found as a root.
 */
export function compileEvents(equations: RateEquations, events: readonly NetworkEvent[]): CompiledEvents {
  const leaves: Node[] = [];
  const functions: NamedNodes[] = [];
  const compiled = events.map<OdeEvent>(({ when, set }, index) => {
    const firstLeaf = leaves.length;
    const own: Node[] = [];
    const holds = truth(equations, when, own);
    leaves.push(...own);
    const values = `event ${index}`;
    functions.push({
      name: values,
      nodes: set.map(({ value }) => expressionNode(equations.graph, value, equations.resolve)),
    });
    const targets = set.map(({ name }) => {
      const target = equations.target(name);
      if (target === null) {
        throw new RateError(
          `An event sets "${name}", which is neither a species nor a constant of the network.`,
        );
      }
      return target;
    });
    return { firstLeaf, leafCount: own.length, holds, values, targets };
  });
  if (compiled.length > 0) functions.push({ name: leavesFunction, nodes: leaves });
  equations.requireValues();
  return { events: compiled, functions };
}

/** Whether the condition holds, from the signs of the leaves that it appends. */
function truth(equations: RateEquations, condition: Expression, leaves: Node[]): Truth {
  const { graph, resolve } = equations;
  switch (condition.kind) {
    case 'not': {
      const of = truth(equations, condition.of, leaves);
      return (signs) => !of(signs);
    }
    case 'logic': {
      const left = truth(equations, condition.left, leaves);
      const right = truth(equations, condition.right, leaves);
      return condition.operator === 'and'
        ? (signs) => left(signs) && right(signs)
        : (signs) => left(signs) || right(signs);
    }
    case 'compare': {
      const left = expressionNode(graph, condition.left, resolve);
      const right = expressionNode(graph, condition.right, resolve);
      const leaf = leaves.push(graph.subtract(left, right)) - 1;
      const test = signTests[condition.operator];
      return (signs) => test(signs[leaf]!);
    }
    default: {
      const leaf = leaves.push(expressionNode(graph, condition, resolve)) - 1;
      return (signs) => signs[leaf] !== 0;
    }
  }
}

const signTests: Readonly<Record<'==' | '!=' | '<' | '<=' | '>' | '>=', (sign: number) => boolean>> = {
  '==': (sign) => sign === 0,
  '!=': (sign) => sign !== 0,
  '<': (sign) => sign < 0,
  '<=': (sign) => sign <= 0,
  '>': (sign) => sign > 0,
  '>=': (sign) => sign >= 0,
};
