import * as z from 'zod';

/** What this process does, and how it talks about it. */
export const processSchema = z.object({
  /** `all` serves and computes, `server` only serves, `worker` only computes. */
  PROCESS: z.enum(['all', 'server', 'worker']).default('all'),
  /** Kernel workers kept by this process; by default as many as cores, two at least. */
  COMPUTE_WORKERS: z.coerce.number().int().min(1).max(64).optional(),
  /** Folder with the bundled kernel worker. */
  WORKER_FOLDER: z.string().optional(),
  LOG_LEVEL: z.enum(['error', 'warn', 'info', 'debug']).default('info'),
  /** `1` shows the seeded accounts on the sign-in page. */
  DEMO: z
    .enum(['0', '1'])
    .default('0')
    .transform((value) => value === '1'),
});
