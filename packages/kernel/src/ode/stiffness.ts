import type { MethodKind } from './methods/registry.ts';

/**
 * Beyond this h|λ| the explicit method counts as held back by stability: its stability interval on the negative axis
 * ends at 3.3, while steps held back by accuracy stay below 1.7 even at a tolerance of 1e-4.
 */
const explicitLimit = 2;
/** So many such steps (forgiven after `calm` others in a row) before the system counts as stiff. */
const hits = 15;
const calm = 6;
/** Below this h|λ| an explicit step would be stable by far; after so many such steps it takes over again. */
const implicitLimit = 1;
const easySteps = 10;

/**
 * Follows h|λ| along a course and says which method suits (explicit side: Hairer, Wanner, Solving Ordinary Differential
 * Equations II, IV.2; implicit side: a bound of the spectral radius by the Jacobian).
 */
export class StiffnessWatch {
  private hit = 0;
  private quiet = 0;
  private easy = 0;
  /** Whether the explicit method was held back by stability. */
  suspected = false;

  /** The kind of method for the next step, given h|λ| of the last one. */
  afterStep(kind: MethodKind, size: number): MethodKind {
    if (kind === 'stiff') {
      this.easy = size < implicitLimit ? this.easy + 1 : 0;
      if (this.easy < easySteps) return 'stiff';
    } else {
      if (size > explicitLimit) {
        this.quiet = 0;
        this.hit++;
      } else if (++this.quiet >= calm) {
        this.hit = 0;
      }
      if (this.hit < hits) return 'nonstiff';
      this.suspected = true;
    }
    this.hit = 0;
    this.quiet = 0;
    this.easy = 0;
    return kind === 'stiff' ? 'nonstiff' : 'stiff';
  }
}
