const NEEDS_ESCAPE = /[\\\t\n\r]/;
const ESCAPED = /[\\\t\n\r]/g;
const ESCAPES: Readonly<Record<string, string>> = { '\\': '\\\\', '\t': '\\t', '\n': '\\n', '\r': '\\r' };
const UNESCAPED: Readonly<Record<string, string>> = { b: '\b', f: '\f', n: '\n', r: '\r', t: '\t', v: '\v' };

/**
 * A value as the text format of PostgreSQL's COPY wants it. Source: PostgreSQL 15 manual, COPY, "Text Format".
 * U+0000 can't be stored and must be refused before.
 */
export function copyTextEscape(value: string): string {
  return NEEDS_ESCAPE.test(value) ? value.replace(ESCAPED, (char) => ESCAPES[char] ?? char) : value;
}

/** The value of a field of COPY's text format; not for the null mark, which is the whole field '\N'. */
export function copyTextUnescape(field: string): string {
  return field.includes('\\')
    ? field.replace(/\\(.)/gs, (_, char: string) => UNESCAPED[char] ?? char)
    : field;
}
