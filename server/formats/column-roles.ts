import type { CatalogueDetail } from '../../shared/schemas/catalogue';
import type { ColumnMapping } from '../../shared/schemas/mapping';

type Column = Pick<CatalogueDetail['columns'][number], 'name' | 'kind'>;

/** What a mapping makes of each column, in words for people. */
export function columnRoles(columns: readonly Column[], mapping: ColumnMapping): CatalogueDetail['columns'] {
  const roles = new Map<number, string[]>();
  const say = (index: number | null, role: string) => {
    if (index !== null) roles.set(index, [...(roles.get(index) ?? []), role]);
  };
  const { position, error, properMotion, redshift } = mapping;
  if (position.kind === 'two-columns') {
    say(position.raColumn, 'right ascension');
    say(position.decColumn, 'declination');
  } else {
    say(position.column, 'position');
  }
  say(mapping.keyColumn, 'own key');
  for (const name of mapping.names) say(name.column, name.separator === null ? 'name' : 'names');
  if (error?.kind === 'circle') say(error.column, `positional error (${error.meaning}, ${error.unit})`);
  if (error?.kind === 'axes') {
    say(error.raColumn, `error in right ascension (${error.meaning}, ${error.raUnit})`);
    say(error.decColumn, `error in declination (${error.meaning}, ${error.decUnit})`);
  }
  if (error?.kind === 'ellipse') {
    say(error.majorColumn, `error ellipse, major axis (${error.meaning}, ${error.unit})`);
    say(error.minorColumn, `error ellipse, minor axis (${error.meaning}, ${error.unit})`);
    say(error.paColumn, 'error ellipse, position angle');
  }
  if (properMotion !== null) {
    say(properMotion.raColumn, `proper motion in right ascension (${properMotion.unit})`);
    say(properMotion.decColumn, `proper motion in declination (${properMotion.unit})`);
  }
  for (const band of mapping.photometry) {
    say(band.column, `${band.kind} ${band.band} (${band.unit})`);
    say(band.errorColumn, `error of ${band.kind} ${band.band}`);
  }
  if (redshift !== null) {
    say(redshift.column, redshift.kind === 'redshift' ? 'redshift' : 'velocity (km/s)');
    say(redshift.errorColumn, `error of ${redshift.kind === 'redshift' ? 'redshift' : 'velocity'}`);
  }
  return columns.map(({ name, kind }, index) => ({
    index,
    name,
    kind,
    role: roles.get(index)?.join(', ') ?? 'kept as written',
  }));
}
