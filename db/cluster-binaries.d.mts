/** The oldest PostgreSQL that the schema is written for. */
export const MINIMUM_MAJOR: number;

/** The server programs of PostgreSQL, of any sufficient version or of exactly `major`; null when there are none. */
export function findPostgres(major?: number): { binDir: string; major: number } | null;
