import { dormandPrinceMethod } from './dormand-prince/method.ts';
import type { Method } from './method.ts';
import { rodas5pMethod } from './rodas5p/method.ts';

/** The methods by what a cell asks for; "auto" begins with the first and changes to the other where it pays. */
export const methods = {
  nonstiff: dormandPrinceMethod,
  stiff: rodas5pMethod,
} as const satisfies Record<string, Method>;

export type MethodKind = keyof typeof methods;
