import * as z from 'zod';

/** How the application is reached. */
export const httpSchema = z.object({
  HOST: z.string().min(1).default('127.0.0.1'),
  PORT: z.coerce.number().int().min(0).max(65535).default(7070),
  /** The address people type, where it is not that of HOST and PORT; also the only origin then allowed. */
  PUBLIC_URL: z
    .url({ protocol: /^https?$/u, error: 'must be an address like https://stillroom.example' })
    .optional(),
  /** How many proxies of ours stand in front; 0 trusts no forwarded header. */
  TRUSTED_PROXIES: z.coerce.number().int().min(0).max(5).default(0),
  /** Multiplies every request limit; load runs raise it. */
  RATE_FACTOR: z.coerce.number().min(0.01).max(10_000).default(1),
  /** Folder with the built client. */
  CLIENT_FOLDER: z.string().optional(),
});
