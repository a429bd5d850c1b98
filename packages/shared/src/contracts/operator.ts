import * as z from 'zod/mini';

export const installationPatch = z.object({ signUp: z.optional(z.enum(['open', 'invitation'])) });

/** GET /api/operator/health */
export interface HealthView {
  readonly version: string;
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

/** GET /api/operator/outbox: mails caught here, newest first. Review letters of masked reviewers have no body. */
export interface OutboxMail {
  readonly id: string;
  readonly at: string;
  readonly to: string;
  readonly subject: string;
  readonly text: string | null;
  readonly state: 'waiting' | 'sent' | 'failed';
}
