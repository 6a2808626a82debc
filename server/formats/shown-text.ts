const SHOWN_LENGTH = 40;
/** How much of a row that is set aside is kept. */
export const MAX_RAW_LENGTH = 2_000;
const CONTROLS = /[\u0000-\u0008\u000b\u000c\u000e-\u001f]/g;

const LONE_SURROGATE = /[\ud800-\udbff](?![\udc00-\udfff])|(?<![\ud800-\udbff])[\udc00-\udfff]/g;

/** Text that the database and a screen can take: control characters as their pictures, cut at `maxLength`. */
export function storableText(text: string, maxLength: number): string {
  const cut = text.length > maxLength ? text.slice(0, maxLength).replace(LONE_SURROGATE, '') : text;
  return cut.replace(CONTROLS, (char) => String.fromCharCode(0x2400 + char.charCodeAt(0)));
}

/** A cell as a message quotes it: at most 40 characters. */
export function shownCell(text: string): string {
  return text.length > SHOWN_LENGTH
    ? `${storableText(text, SHOWN_LENGTH)}…`
    : storableText(text, SHOWN_LENGTH);
}

/** How messages call a column: its name in the header, or its number for lack of one. */
export function columnTitle(name: string | undefined, index: number): string {
  return name === undefined || name.trim() === '' ? `column ${index + 1}` : shownCell(name.trim());
}
