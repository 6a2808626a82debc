import { redirect, type LoaderFunctionArgs } from 'react-router-dom';
import type { SessionState } from '../../shared/schemas/session';
import { noSuchGroup } from './problem-error';
import { queryClient } from './query-client';
import { sessionQuery } from './session';

function session(): Promise<SessionState> {
  return queryClient.ensureQueryData(sessionQuery);
}

/** Where a person with this session begins. */
export function firstAddress({ person, memberships, needsSetup }: SessionState): string {
  if (needsSetup) return '/set-up';
  if (person === null) return '/sign-in';
  const only = memberships.length === 1 ? memberships[0] : undefined;
  return only === undefined ? '/groups' : `/g/${only.group}/today`;
}

/** An address to come back to after signing in: only a path of this application, nothing that leads elsewhere. */
export function safeBack(back: string | null): string | null {
  return back !== null && /^\/(g\/|groups$)/.test(back) && !back.includes('\\') && !back.includes('//')
    ? back
    : null;
}

/** Guard of pages that need a sign-in; the address is kept for afterwards. */
export async function needsPerson({ request }: LoaderFunctionArgs): Promise<SessionState | Response> {
  const state = await session();
  if (state.needsSetup) return redirect('/set-up');
  if (state.person === null) {
    const { pathname, search } = new URL(request.url);
    return redirect(`/sign-in?back=${encodeURIComponent(pathname + search)}`);
  }
  return state;
}

/** Guard of the pages of a group. */
export async function needsMembership(args: LoaderFunctionArgs): Promise<Response | null> {
  const state = await needsPerson(args);
  if (state instanceof Response) return state;
  if (state.memberships.some(({ group }) => group === args.params.group)) return null;
  throw noSuchGroup(args.params.group ?? '');
}

/** '/' leads to where the person begins. */
export async function toFirstAddress(): Promise<Response> {
  return redirect(firstAddress(await session()));
}

/** The sign-in page is for people who are not signed in. */
export async function needsNobody(): Promise<Response | null> {
  const state = await session();
  return state.needsSetup || state.person !== null ? redirect(firstAddress(state)) : null;
}

/** The set-up page exists only while the installation is empty. */
export async function needsEmptyInstallation(): Promise<Response | null> {
  const state = await session();
  return state.needsSetup ? null : redirect(firstAddress(state));
}
