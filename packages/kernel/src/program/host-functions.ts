import { elementary } from '@stillroom/shared/expression';

/**
 * The elementary functions that a program calls by number, with their derivatives in derivative.ts. They are the
 * project's own, so that a result does not depend on the machine or on the version of the JavaScript engine.
 */
export const hostFunctions = [
  { name: 'exp', arity: 1, call: elementary.exp },
  { name: 'ln', arity: 1, call: elementary.ln },
  { name: 'log10', arity: 1, call: elementary.log10 },
  { name: 'sin', arity: 1, call: elementary.sin },
  { name: 'cos', arity: 1, call: elementary.cos },
  { name: 'tan', arity: 1, call: elementary.tan },
  { name: 'sinh', arity: 1, call: elementary.sinh },
  { name: 'cosh', arity: 1, call: elementary.cosh },
  { name: 'tanh', arity: 1, call: elementary.tanh },
  { name: 'asin', arity: 1, call: elementary.asin },
  { name: 'acos', arity: 1, call: elementary.acos },
  { name: 'atan', arity: 1, call: elementary.atan },
  { name: 'round', arity: 1, call: elementary.round },
  { name: 'pow', arity: 2, call: elementary.pow },
] as const;

export type HostName = (typeof hostFunctions)[number]['name'];

/** The number by which a program calls the function. */
export function hostNumber(name: HostName): number {
  return hostFunctions.findIndex((entry) => entry.name === name);
}
