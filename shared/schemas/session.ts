import { z } from 'zod';
import { ROLES } from '../words';

export const email = z
  .string()
  .trim()
  .toLowerCase()
  .max(254)
  .pipe(z.email({ error: 'An e-mail address looks like name@example.org.' }));

/** Length only, no composition rules (NIST SP 800-63B, from memory). */
export const newPassword = z
  .string()
  .min(12, { error: 'Use at least 12 characters.' })
  .max(256, { error: 'Use at most 256 characters.' });

export const personName = z.string().trim().min(1, { error: 'Write a name.' }).max(100);
export const groupName = z.string().trim().min(2, { error: 'Write at least 2 characters.' }).max(80);
export const groupSlug = z.string().regex(/^[a-z0-9][a-z0-9-]{0,49}$/);

export const personSummary = z.strictObject({ id: z.number().int(), email: z.string(), name: z.string() });
export type PersonSummary = z.infer<typeof personSummary>;

export const membershipSummary = z.strictObject({
  group: groupSlug,
  name: z.string(),
  role: z.enum(ROLES),
});
export type MembershipSummary = z.infer<typeof membershipSummary>;

export const sessionState = z.strictObject({
  person: personSummary.nullable(),
  memberships: z.array(membershipSummary),
  /** True while the installation has no account at all: the first person sets it up. */
  needsSetup: z.boolean(),
});
export type SessionState = z.infer<typeof sessionState>;

export const signIn = z.strictObject({ email, password: z.string().min(1, { error: 'Write your password.' }).max(256) });
export type SignIn = z.infer<typeof signIn>;

export const setUp = z.strictObject({ name: personName, email, password: newPassword, groupName });
export type SetUp = z.infer<typeof setUp>;
