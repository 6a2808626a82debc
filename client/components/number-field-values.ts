/** A typed number for the form: null for an empty field, NaN for what can't be read (the schema then refuses it). */
export function numberOrNull(value: unknown): number | null {
  if (typeof value === 'number') return value;
  const text = typeof value === 'string' ? value.trim().replace(/[−–]/, '-') : '';
  return text === '' ? null : Number(text);
}
