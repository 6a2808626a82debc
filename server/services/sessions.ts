import argon2 from 'argon2';
import { and, eq, gt, isNull, sql } from 'drizzle-orm';
import { jwtVerify, SignJWT } from 'jose';
import { inTransaction, type Scope, type Tx } from '../../db/client';
import { membership, researchGroup } from '../../db/schema/group';
import { loginSession, person } from '../../db/schema/person';
import type { SessionState, SetUp, SignIn } from '../../shared/schemas/session';
import type { Context, GroupActor, PersonActor } from '../context';
import { refuse } from '../errors';
import { insertGroup } from './groups';

const SESSION_DAYS = 30;
const SEEN_EVERY_MINUTES = 5;
const NOBODY: Scope = { groupId: null, personId: null };
/** Serialises the first set-up: any constant. */
const SETUP_LOCK = 402_117;

/** Hash of a random password nobody has: unknown addresses cost as much time as known ones. */
const DECOY_HASH = argon2.hash(crypto.randomUUID(), { type: argon2.argon2id });

export function hashPassword(password: string): Promise<string> {
  return argon2.hash(password, { type: argon2.argon2id });
}

export interface NewSession {
  token: string;
  expiresAt: Date;
}

/** Checks e-mail and password and opens a session; refuses with the same sentence whichever is wrong. */
export async function signIn(context: Context, input: SignIn, userAgent: string): Promise<NewSession> {
  const known = await inTransaction(context.database, NOBODY, (tx) =>
    tx.query.person.findFirst({ where: eq(person.email, input.email) }),
  );
  const matches = await argon2.verify(known?.passwordHash ?? (await DECOY_HASH), input.password);
  if (known === undefined || !matches) refuse('sign-in-failed', 'No account has this e-mail and password.');
  return inTransaction(context.database, NOBODY, (tx) => openSession(context, tx, known.id, userAgent));
}

/** Makes the first account with its group; refused once any account exists. */
export async function setUpInstallation(context: Context, input: SetUp, userAgent: string): Promise<NewSession> {
  const passwordHash = await hashPassword(input.password);
  return inTransaction(context.database, NOBODY, async (tx) => {
    await tx.execute(sql`select pg_advisory_xact_lock(${SETUP_LOCK})`);
    if (!(await isEmpty(tx))) refuse('already-set-up', 'This installation already has accounts.');
    const [owner] = await tx
      .insert(person)
      .values({ email: input.email, name: input.name, passwordHash })
      .returning({ id: person.id });
    if (owner === undefined) throw new Error('insert returned no person');
    await insertGroup(tx, owner.id, input.groupName);
    return openSession(context, tx, owner.id, userAgent);
  });
}

async function isEmpty(tx: Tx): Promise<boolean> {
  const first = await tx.select({ id: person.id }).from(person).limit(1);
  return first.length === 0;
}

async function openSession(context: Context, tx: Tx, personId: number, userAgent: string): Promise<NewSession> {
  const expiresAt = new Date(Date.now() + SESSION_DAYS * 86_400_000);
  const [session] = await tx
    .insert(loginSession)
    .values({ personId, expiresAt, userAgent: userAgent.slice(0, 300) })
    .returning({ id: loginSession.id });
  if (session === undefined) throw new Error('insert returned no session');
  const token = await new SignJWT({ sid: session.id })
    .setProtectedHeader({ alg: 'HS256' })
    .setIssuedAt()
    .setExpirationTime(expiresAt)
    .sign(context.config.sessionSecret);
  return { token, expiresAt };
}

/** The person behind a cookie's token; null when it is forged, expired or signed out. */
export async function personOfToken(context: Context, token: string): Promise<PersonActor | null> {
  let sessionId: unknown;
  try {
    sessionId = (await jwtVerify(token, context.config.sessionSecret, { algorithms: ['HS256'] })).payload.sid;
  } catch {
    return null;
  }
  if (typeof sessionId !== 'string') return null;
  const id = sessionId;
  return inTransaction(context.database, NOBODY, async (tx) => {
    const [row] = await tx
      .select({
        personId: person.id,
        name: person.name,
        email: person.email,
        stale: sql<boolean>`${loginSession.lastSeenAt} < now() - make_interval(mins => ${SEEN_EVERY_MINUTES})`,
      })
      .from(loginSession)
      .innerJoin(person, eq(person.id, loginSession.personId))
      .where(and(eq(loginSession.id, id), isNull(loginSession.revokedAt), gt(loginSession.expiresAt, sql`now()`)));
    if (row === undefined) return null;
    const { stale, ...known } = row;
    if (stale) await tx.update(loginSession).set({ lastSeenAt: sql`now()` }).where(eq(loginSession.id, id));
    return { ...known, sessionId: id };
  });
}

/** The actor of a person in the group of a URL; null when the person is no member (or the group does not exist). */
export async function memberOf(context: Context, who: PersonActor, slug: string): Promise<GroupActor | null> {
  return inTransaction(context.database, { groupId: null, personId: who.personId }, async (tx) => {
    const [row] = await tx
      .select({ groupId: membership.groupId, role: membership.role })
      .from(membership)
      .innerJoin(researchGroup, eq(researchGroup.id, membership.groupId))
      .where(and(eq(researchGroup.slug, slug), eq(membership.personId, who.personId)));
    return row === undefined ? null : { personId: who.personId, group: slug, ...row };
  });
}

/** What the client needs to know first: who is signed in, in which groups, or that nobody exists yet. */
export async function sessionState(context: Context, who: PersonActor | null): Promise<SessionState> {
  return inTransaction(context.database, { groupId: null, personId: who?.personId ?? null }, async (tx) => {
    if (who === null) return { person: null, memberships: [], needsSetup: await isEmpty(tx) };
    const memberships = await tx
      .select({ group: researchGroup.slug, name: researchGroup.name, role: membership.role })
      .from(membership)
      .innerJoin(researchGroup, eq(researchGroup.id, membership.groupId))
      .where(eq(membership.personId, who.personId))
      .orderBy(researchGroup.name, researchGroup.id);
    return { person: { id: who.personId, email: who.email, name: who.name }, memberships, needsSetup: false };
  });
}

/** Ends the session of the request; `everywhere` ends all of the person's sessions. */
export async function signOut(context: Context, who: PersonActor, scope: 'here' | 'everywhere'): Promise<void> {
  await inTransaction(context.database, NOBODY, (tx) =>
    tx
      .update(loginSession)
      .set({ revokedAt: sql`now()` })
      .where(
        and(
          scope === 'here' ? eq(loginSession.id, who.sessionId) : eq(loginSession.personId, who.personId),
          isNull(loginSession.revokedAt),
        ),
      ),
  );
}
