import type {
  Applies,
  Citation,
  Hypothesis,
  Verdict,
  VerdictId,
  VerdictKinetics,
  VerdictScope,
} from '@stillroom/shared/cells';
import type { TheoremContext } from './context.ts';

/** What a theorem has to say about one network; together with the theorem's own data it makes a verdict. */
export interface Judgement {
  readonly applies: Applies;
  /** Which part of the theorem applies, where it has several. */
  readonly case?: string;
  readonly scope: VerdictScope;
  /** The rate laws this case speaks about, where they differ from those of the theorem. */
  readonly kinetics?: VerdictKinetics;
  readonly hypotheses: readonly Hypothesis[];
  /** States what is proven and no more; for "no" and "undecided" it says that nothing follows. */
  readonly conclusion: string;
  /** What the reader might expect and the theorem does not say. */
  readonly silentOn?: string;
}

/**
 * A published theorem as one object. `judge` checks its hypotheses on a network and words the conclusion; it never
 * throws for a network that was read without error, and spends a bounded number of operations.
 */
export interface Theorem {
  readonly id: VerdictId;
  readonly title: string;
  /** The theorem in one or two sentences, for the explanation beside a verdict. */
  readonly statement: string;
  readonly citation: readonly Citation[];
  /** The rate laws the theorem speaks about. */
  readonly kinetics: VerdictKinetics;
  judge(context: TheoremContext): Judgement;
}

/** The verdict of a theorem on the network of a context. */
export function verdictOf(theorem: Theorem, context: TheoremContext): Verdict {
  const { applies, scope, hypotheses, conclusion, ...optional } = theorem.judge(context);
  return {
    id: theorem.id,
    title: theorem.title,
    applies,
    ...(optional.case === undefined ? {} : { case: optional.case }),
    scope,
    kinetics: optional.kinetics ?? theorem.kinetics,
    hypotheses,
    conclusion,
    ...(optional.silentOn === undefined ? {} : { silentOn: optional.silentOn }),
    citation: theorem.citation,
  };
}

/** "yes" when all hypotheses hold, "no" when one fails, otherwise "undecided". */
export function appliesWhenAllHold(hypotheses: readonly Hypothesis[]): Applies {
  if (hypotheses.some((hypothesis) => hypothesis.holds === false)) return 'no';
  return hypotheses.every((hypothesis) => hypothesis.holds === true) ? 'yes' : 'undecided';
}
