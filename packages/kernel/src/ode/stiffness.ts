import type { MethodKind } from './methods/registry.ts';

/** Beyond this h|λ| the explicit method is held back by stability (its real stability interval is about 3.3). */
const explicitLimit = 3.25;
/** So often in a row (hits forgiven after `calm` others) before the system counts as stiff. */
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
