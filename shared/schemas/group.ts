import { z } from 'zod';
import { ROLES } from '../words';
import { email, groupName, groupSlug, newPassword, personName } from './session';
import { instant } from './page';

export const groupSummary = z.strictObject({ group: groupSlug, name: z.string(), role: z.enum(ROLES) });

export const groupDetail = z.strictObject({
  group: groupSlug,
  name: z.string(),
  role: z.enum(ROLES),
  createdAt: instant,
  catalogues: z.number().int(),
  sources: z.number().int(),
  objects: z.number().int(),
  storedBytes: z.number().int(),
});
export type GroupDetail = z.infer<typeof groupDetail>;

export const newGroup = z.strictObject({ name: groupName });
export const groupChange = z.strictObject({ name: groupName });

export const member = z.strictObject({
  personId: z.number().int(),
  name: z.string(),
  email: z.string(),
  role: z.enum(ROLES),
  since: instant,
});
export type Member = z.infer<typeof member>;
export const memberList = z.strictObject({ items: z.array(member) });

/** Adds a person to the group; when no account has the e-mail yet, one is made with the given first password. */
export const newMember = z.strictObject({
  email,
  name: personName,
  role: z.enum(ROLES),
  password: newPassword.optional(),
});
export type NewMember = z.infer<typeof newMember>;
export const memberChange = z.strictObject({ role: z.enum(ROLES) });

export const auditEvent = z.strictObject({
  id: z.number().int(),
  at: instant,
  person: z.string().nullable(),
  action: z.string(),
  subject: z.string(),
  detail: z.record(z.string(), z.unknown()),
});
