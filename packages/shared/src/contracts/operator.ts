import * as z from 'zod/mini';

export const installationPatch = z.object({ signUp: z.optional(z.enum(['open', 'invitation'])) });

/** GET /api/operator/health */
export interface HealthView {
  /** Version of the installation. */
  readonly version: string;
  /** Version of its engine, as records name it. */
  readonly engine: string;
  readonly lines: readonly {
    readonly name: string;
    readonly state: 'well' | 'warning' | 'ill';
    readonly words: string;
  }[];
  readonly signUp: 'open' | 'invitation';
}

/** GET /api/operator/people */
export interface OperatorPerson {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  readonly operator: boolean;
  readonly since: string;
  readonly lastSeen: string | null;
  readonly groups: number;
}

/** GET /api/operator/queue */
export interface QueueView {
  readonly workers: readonly {
    readonly id: string;
    readonly state: 'idle' | 'working';
    readonly kind: string | null;
    readonly since: string | null;
    readonly isolation: string;
  }[];
  readonly waiting: number;
  readonly running: number;
  readonly groups: readonly {
    readonly name: string;
    readonly waiting: number;
    readonly running: number;
    readonly secondsToday: number;
  }[];
}

/** GET /api/operator/outbox: letters, newest first. Those whose link opens something have no words here. */
export interface OutboxMail {
  readonly id: string;
  readonly at: string;
  /** The address; of a masked reviewer what the group calls them. */
  readonly to: string;
  readonly subject: string;
  readonly text: string | null;
  /** Why there are no words: they are shown on request; a mail server alone carries them; they were delivered. */
  readonly sealed: 'on request' | 'by mail alone' | 'delivered' | null;
  /** When it was last shown on request. */
  readonly shownAt: string | null;
  readonly state: 'waiting' | 'sent' | 'failed';
}

/** POST /api/operator/outbox/:mail/showing: the letter itself; that it was shown is written down. */
export interface ShownLetter {
  readonly id: string;
  readonly to: string;
  readonly subject: string;
  readonly text: string;
}
