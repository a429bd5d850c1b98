import * as z from 'zod';

/** Signs session cookies; a change of it signs everybody out. */
export const sessionSchema = z.object({
  SESSION_SECRET: z.string().min(32, 'must have at least 32 characters'),
  SESSION_DAYS: z.coerce.number().int().min(1).max(365).default(30),
});
