import type { MethodKind } from './methods/registry.ts';

/**
 * Where the running mean of h|λ| passes this, the explicit method is held back by stability: its stability interval on
 * the negative axis ends at 3.3, while steps held back by accuracy stay below 1.7 even at a tolerance of 1e-4.
 */
const explicitLimit = 1.75;
/** Weight of the newest step in the mean: about the last ten steps count. */
const newest = 0.1;
/** Below this h|λ| an explicit step would be stable by far; after so many such steps it takes over again. */
const implicitLimit = 0.5;
const easySteps = 10;

/**
 * Follows h|λ| along a course and says which method suits. Two estimates of |λ|, of which the larger counts: the
 * largest entry on the diagonal of the Jacobian, which in kinetics is the fastest rate of decay (by Gershgorin's circles
 * no eigenvalue of a closed system is beyond twice that), and what the stages of an explicit step show (Hairer, Wanner,
 * Solving Ordinary Differential Equations II, IV.2), which finds fast modes off the diagonal.
 */
export class StiffnessWatch {
  private mean = 0;
  private easy = 0;
  /** Whether the explicit method was held back by stability. */
  suspected = false;

  /** The kind of method for the next step, given h|λ| of the last one by the Jacobian and by the stages. */
  afterStep(kind: MethodKind, byJacobian: number, byStages: number): MethodKind {
    const size = Math.max(byJacobian, byStages);
    if (kind === 'stiff') {
      this.easy = size < implicitLimit ? this.easy + 1 : 0;
      if (this.easy < easySteps) return 'stiff';
    } else {
      this.mean += newest * (size - this.mean);
      if (!(this.mean > explicitLimit)) return 'nonstiff';
      this.suspected = true;
    }
    this.mean = 0;
    this.easy = 0;
    return kind === 'stiff' ? 'nonstiff' : 'stiff';
  }
}
