import * as z from 'zod/mini';

/** The name of a cell in settings; empty while nothing is chosen yet, which the plan explains. */
export const cellReference = z.string().check(z.maxLength(200));

/** A finite number; JSON has no others, a live document may. */
export const finite = z.number().check(z.refine(Number.isFinite, 'needs a finite number'));
const positive = finite.check(z.gt(0));
const values = z.record(z.string(), finite);

/** Settings of a network cell: none, all is in its text. */
export const networkSettings = z.strictObject({});

/** Settings of a structure cell. */
export const structureSettings = z.strictObject({ network: cellReference });

/** Settings of a balance cell: constants given here take the place of the text's. */
export const balanceSettings = z.strictObject({
  network: cellReference,
  constants: z.optional(values),
});

/** Settings of a trajectory cell; numbers in the units of the network's text. */
export const trajectorySettings = z
  .strictObject({
    network: cellReference,
    until: z.optional(positive),
    points: z.optional(z.int().check(z.gte(2), z.lte(100_000))),
    times: z.optional(z.array(finite.check(z.gte(0))).check(z.minLength(1), z.maxLength(100_000))),
    method: z.optional(z.enum(['auto', 'stiff', 'nonstiff'])),
    rtol: z.optional(finite.check(z.gte(1e-13), z.lte(0.1))),
    atol: z.optional(positive),
    constants: z.optional(values),
    start: z.optional(values),
    events: z.optional(
      z.array(z.strictObject({ when: z.string(), set: z.record(z.string(), z.union([finite, z.string()])) })),
    ),
    sensitivities: z.optional(z.union([z.boolean(), z.array(z.string())])),
  })
  .check(
    z.refine(
      ({ until, times }) => until !== undefined || times !== undefined,
      'needs until, the end of the course (or times, a list)',
    ),
  );
