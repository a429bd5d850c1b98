import * as z from 'zod';

/** What this process does, and how it talks about it. */
export const processSchema = z.object({
  /** `all` serves and computes, `server` only serves, `worker` only computes. */
  PROCESS: z.enum(['all', 'server', 'worker']).default('all'),
  /** Kernel workers kept by this process; by default one for each core but one, at least one. */
  COMPUTE_WORKERS: z.coerce.number().int().min(1).max(64).optional(),
  /** Account for kernel workers when started by root: user and group id, `1234:1234`. */
  COMPUTE_ACCOUNT: z
    .string()
    .regex(/^\d+:\d+$/u, 'must be two numbers like 1234:1234')
    .optional(),
  /** Folder with the bundled kernel worker. */
  WORKER_FOLDER: z.string().optional(),
  LOG_LEVEL: z.enum(['error', 'warn', 'info', 'debug']).default('info'),
  /** `1` shows the seeded accounts on the sign-in page. */
  DEMO: z
    .enum(['0', '1'])
    .default('0')
    .transform((value) => value === '1'),
});
