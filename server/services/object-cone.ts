import { sql, type SQL } from 'drizzle-orm';
import type { Tx } from '../../db/client';
import { raHalfWidthDeg, separationArcsec, wrapRaDeg } from '../../shared/astro/sphere';
import { refuse } from '../errors';
import { OBJECT_COLUMNS, type ObjectRow } from './object-summaries';

/** What a cone over the registry may hold; beyond it the person is asked for a smaller radius. */
const MAX_CONE_OBJECTS = 10_000;
const ZONES_PER_DEG = 10;
const ARCSEC_PER_DEG = 3600;
/** The window is this much wider than the cone; the separation decides. */
const WINDOW_PAD = 1 + 1e-9;

export interface Cone {
  raDeg: number;
  decDeg: number;
  radiusArcsec: number;
}

/** Live objects within a cone, the nearest first, all of them; refuses a cone that holds too many. */
export async function objectsInCone(
  tx: Tx,
  cone: Cone,
  filters: readonly SQL[],
): Promise<(ObjectRow & { sepArcsec: number })[]> {
  const { rows } = await tx.execute<ObjectRow>(sql`
    select ${OBJECT_COLUMNS} from object o
    where ${sql.join([...filters, ...windowOf(cone)], sql` and `)} limit ${MAX_CONE_OBJECTS + 1}`);
  if (rows.length > MAX_CONE_OBJECTS) {
    refuse('bad-request', `More than ${MAX_CONE_OBJECTS} objects lie around that position.`, {
      hint: 'Choose a smaller radius.',
    });
  }
  return rows
    .map((row) => ({ ...row, sepArcsec: separationArcsec(cone.raDeg, cone.decDeg, row.raDeg, row.decDeg) }))
    .filter((row) => row.sepArcsec <= cone.radiusArcsec)
    .sort((a, b) => a.sepArcsec - b.sepArcsec || a.number - b.number);
}

/**
 * The box around a cone: declination zones first (Gray, Nieto-Santisteban & Szalay 2006), then a window in right
 * ascension, in two parts across 0/360, and all of it where the cone touches a pole.
 */
function windowOf({ raDeg, decDeg, radiusArcsec }: Cone): SQL[] {
  const radiusDeg = (radiusArcsec * WINDOW_PAD) / ARCSEC_PER_DEG;
  const low = Math.max(-90, decDeg - radiusDeg);
  const high = Math.min(90, decDeg + radiusDeg);
  const zoneOf = (deg: number) => Math.floor((deg + 90) * ZONES_PER_DEG);
  // One zone more on either side: the database's floor may round the other way at a border.
  const zones = sql`o.zone between ${zoneOf(low) - 1} and ${zoneOf(high) + 1}`;
  const halfWidth = raHalfWidthDeg(radiusArcsec * WINDOW_PAD, decDeg);
  const decs = sql`o.dec_deg between ${low} and ${high}`;
  if (halfWidth >= 180) return [zones, decs];
  const from = wrapRaDeg(raDeg - halfWidth);
  const to = wrapRaDeg(raDeg + halfWidth);
  const ras =
    from <= to ? sql`o.ra_deg between ${from} and ${to}` : sql`(o.ra_deg >= ${from} or o.ra_deg <= ${to})`;
  return [zones, decs, ras];
}
