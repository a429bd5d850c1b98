import * as z from 'zod/mini';

/** E-mail addresses are compared trimmed and in lower case. */
export const email = z
  .string()
  .check(
    z.trim(),
    z.toLowerCase(),
    z.maxLength(254),
    z.regex(/^[^\s@]+@[^\s@]+\.?[^\s@]*$/u, 'An e-mail address looks like name@place.org.'),
  );
export const personName = z.string().check(z.trim(), z.minLength(1, 'A name is needed.'), z.maxLength(120));
export const password = z
  .string()
  .check(z.minLength(10, 'A password needs at least 10 characters.'), z.maxLength(200));

export const signInRequest = z.object({ email, password: z.string().check(z.maxLength(200)) });
export const signUpRequest = z.object({
  email,
  name: personName,
  password,
  invitation: z.optional(z.string()),
});
export const emailRequest = z.object({ email });
export const tokenRequest = z.object({ token: z.string().check(z.minLength(10), z.maxLength(200)) });
export const newPasswordRequest = z.object({ token: z.string(), password });
export const accountPatch = z.object({
  name: z.optional(personName),
  password: z.optional(z.object({ current: z.string(), next: password })),
});

/** The person signed in, as every page may need it. */
export interface Me {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  readonly initials: string;
  /** 0..5: which of the six people colours; also given as ring shape. */
  readonly hue: number;
  readonly operator: boolean;
}

/** GET /api/session */
export interface SessionView {
  readonly me: Me | null;
  readonly signUp: 'open' | 'invitation';
  /** Seeded accounts, shown at sign-in on a demo installation only. */
  readonly demo: readonly { readonly email: string; readonly password: string; readonly role: string }[];
  /** Path of a seeded reviewer's link, on a demo installation only, once its record is frozen. */
  readonly demoReview?: string;
}

/** GET /api/account */
export interface AccountView extends Me {
  readonly since: string;
  readonly sessions: readonly {
    readonly id: string;
    readonly browser: string;
    readonly begun: string;
    readonly lastSeen: string;
    readonly current: boolean;
  }[];
  /** Letters with a link to this account that an operator was shown, to be handed on; newest first. */
  readonly lettersShown: readonly { readonly at: string; readonly subject: string }[];
}
