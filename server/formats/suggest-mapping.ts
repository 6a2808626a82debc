import type { ColumnMapping } from '../../shared/schemas/mapping';
import type { ColumnProfile } from './column-profile';
import { readHeader } from './header-words';
import {
  suggestError,
  suggestPhotometry,
  suggestProperMotion,
  suggestRedshift,
} from './suggest-measurements';
import { suggestNames } from './suggest-names';
import { suggestPosition, type ReadColumn, type SuggestContext } from './suggest-position';

/**
 * What the columns of a table may mean, from header words, units and values; null when no position is found, because
 * without one the rest is no catalogue of sources. A proposal for a person to check, not a decision.
 */
export function suggestMapping(
  profiles: readonly ColumnProfile[],
  context: SuggestContext,
): ColumnMapping | null {
  const columns: ReadColumn[] = profiles.map((profile) => ({ profile, header: readHeader(profile.name) }));
  const position = suggestPosition(columns, context);
  if (position === null) return null;
  const placed = position.kind === 'one-column' ? [position.column] : [position.raColumn, position.decColumn];
  const rest = columns.filter(({ profile }) => !placed.includes(profile.index));
  const photometry = suggestPhotometry(rest);
  const error = suggestError(rest);
  const properMotion = suggestProperMotion(rest);
  const redshift = suggestRedshift(rest);
  const taken = new Set([
    ...placed,
    ...photometry.map(({ column }) => column),
    ...(redshift ? [redshift.column] : []),
  ]);
  return { position, ...suggestNames(columns, taken), error, properMotion, photometry, redshift };
}
