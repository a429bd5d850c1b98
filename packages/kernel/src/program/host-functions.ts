import { elementary } from '@stillroom/shared/expression';

const names = [
  'exp',
  'ln',
  'log10',
  'sin',
  'cos',
  'tan',
  'sinh',
  'cosh',
  'tanh',
  'asin',
  'acos',
  'atan',
  'round',
  'pow',
] as const;
export type HostName = (typeof names)[number];

interface HostFunction {
  readonly name: HostName;
  readonly arity: 1 | 2;
  /** A function of one argument ignores the second. */
  readonly call: (a: number, b: number) => number;
}

/**
 * The elementary functions that a program calls by number, with their derivatives in derivative.ts. They are the
 * project's own, so that a result does not depend on the machine or on the version of the JavaScript engine.
 */
export const hostFunctions: readonly HostFunction[] = names.map((name) => ({
  name,
  arity: name === 'pow' ? 2 : 1,
  call: elementary[name],
}));

/** The number by which a program calls the function. */
export function hostNumber(name: HostName): number {
  return names.indexOf(name);
}
