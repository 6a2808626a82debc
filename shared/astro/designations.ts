/**
 * Name keys: the form of a designation under which it is looked up. Methods handbook, section 12.
 *
 * Two spellings of one designation get one key; two objects never share one. Where a family is not known the
 * key is cautious: only case, blanks and kinds of dashes are evened out. Signs, decimal points, component letters
 * and the digits of coordinates and of long survey numbers are never dropped. The rules are idempotent, so a key
 * may be normalised again.
 */
import {
  ACRONYM_SPELLINGS,
  CONSTELLATIONS,
  COUNTED_FAMILIES,
  DOUBLE_GENITIVES,
  GENITIVES,
  GREEK_CHARACTERS,
  GREEK_SPELLINGS,
  PLANET_FAMILIES,
  ZONE_SPELLINGS,
} from './designation-words';
import { isDigit } from './sexagesimal';

const PLAIN = /^[\x20-\x5e\x60-\x7e]*$/;
/** Between a plain digit and a raised, lowered, circled one or a fraction, which compatibility forms make plain. */
const RAISED_DIGIT_EDGE = /(?<=\d)(?=[²³¹¼-¾⁰⁴-⁹₀-₉①-⒛])|(?<=[²³¹¼-¾⁰⁴-⁹₀-₉①-⒛])(?=\d)/g;
const MAX_SEQUENCE_DIGITS = 9;
const MIN_COORDINATE_DIGITS = 4;

/**
 * The key of a name; '' when nothing readable is left.
 * Examples: 'NGC 0224' -> 'ngc224', 'α¹ Centauri' -> 'alf1cen', 'BD −01°123' -> 'bd-01 123'.
 */
export function nameKey(text: string): string {
  const plain = PLAIN.test(text);
  const written = plain ? evenBlanks(text) : evenCharacters(text);
  if (written === '') return '';
  const caseKept = keyWhereCaseMatters(written);
  if (caseKept !== null) return caseKept;
  const lower = plain ? written.toLowerCase() : evenGreek(written.toLowerCase().normalize('NFKC'));
  return evenFamily(dropBlanks(evenConstellation(withoutAbbreviationDots(lower))));
}

function evenBlanks(text: string): string {
  return (text.includes('  ') ? text.replace(/ {2,}/g, ' ') : text).trim();
}

/** Unicode compatibility forms, blanks, dashes, quotes and degree signs to one character each. */
function evenCharacters(text: string): string {
  const visible = text
    .replace(/[\s_]+/g, ' ')
    .replace(/[\p{Cc}\p{Cf}\p{Cs}]+/gu, '')
    .replace(/º/g, '°')
    // '1234²' must not become '12342': a raised digit next to a plain one stays apart.
    .replace(RAISED_DIGIT_EDGE, '^');
  const even = visible
    .normalize('NFKC')
    .replace(/[\u2010-\u2015\u2043\u2212]/g, '-')
    .replace(/[\u2018\u2019]/g, "'")
    .replace(/[\s_°]+/g, ' ');
  return evenBlanks(even);
}

/**
 * The two places where case tells objects apart: 'r Car' (a star by Bayer's Latin letter) and 'R Car' (a variable),
 * 'HD 1 b' (a planet) and 'HD 1 B' (a star). Only when the rest of the name shows that case is used at all.
 * The lower-case one is marked by an apostrophe.
 */
function keyWhereCaseMatters(written: string): string | null {
  const bayer = written.charCodeAt(1) === 32 ? /^([a-z]) ([A-Z][a-z]+.*)$/.exec(written) : null;
  if (bayer) {
    const [constellation = '', ...rest] = shortenGenitives([
      '',
      ...(bayer[2] ?? '').toLowerCase().split(' '),
    ]).slice(1);
    if (!CONSTELLATIONS.has(constellation)) return null;
    return `${bayer[1]}'${dropBlanks([constellation, ...rest].join(' '))}`;
  }
  const last = written.charCodeAt(written.length - 1);
  if (last < 98 || last > 107) return null;
  const planet = /^([A-Z][A-Za-z]*)[ -]?(\d+) ?([b-k])$/.exec(written);
  if (!planet || !PLANET_FAMILIES.has((planet[1] ?? '').toLowerCase())) return null;
  const host = written.slice(0, -1).trim().toLowerCase();
  return `${evenFamily(dropBlanks(host))}'${planet[3]}`;
}

/** 'N.G.C. 224' -> 'NGC 224', 'mu. cep' -> 'mu cep'. Decimal points have no letter before them and stay. */
function withoutAbbreviationDots(lower: string): string {
  if (!lower.includes('.')) return lower;
  const initials = lower.replace(/^(?:[a-z]\.+)+/, (run) => run.replaceAll('.', ''));
  return initials.replace(/([a-z])\.+(?= |$)/g, '$1');
}

/** Greek characters in three Latin letters; the number that belongs to one stays with it: 'α1cen' -> 'alf1 cen'. */
function evenGreek(lower: string): string {
  return lower.replace(
    /([α-ω])(\^?\d*)(?=([a-z])?)/g,
    (_whole, character: string, number: string, next: string | undefined) =>
      `${GREEK_CHARACTERS.get(character) ?? character}${number}${next ? ' ' : ''}`,
  );
}

/** 'alpha01 centauri b' -> 'alf1 cen b', '61 cygni' -> '61 cyg'. Greek words count only before a constellation. */
function evenConstellation(lower: string): string {
  if (!hasLaterWord(lower)) return lower;
  const words = shortenGenitives(lower.split(' '));
  const first = words[0] ?? '';
  const greek = first.length < 11 ? /^([a-z]+)\^?(\d*)$/.exec(first) : null;
  const letter = greek ? GREEK_SPELLINGS.get(greek[1] ?? '') : undefined;
  if (!greek || letter === undefined) return words.join(' ');
  const numberApart = greek[2] === '' && /^\^?\d{1,2}$/.test(words[1] ?? '');
  const rest = words.slice(numberApart ? 2 : 1);
  if (!CONSTELLATIONS.has(rest[0] ?? '')) return words.join(' ');
  const number = numberApart ? (words[1] ?? '').replace('^', '') : (greek[2] ?? '');
  return [letter + number.replace(/^0+(?=\d)/, ''), ...rest].join(' ');
}

/** True when three letters follow a blank: only then a constellation can be named. Spares most names the split. */
function hasLaterWord(lower: string): boolean {
  for (let at = lower.indexOf(' '); at >= 0; at = lower.indexOf(' ', at + 1)) {
    if (isLetter(lower, at + 1) && isLetter(lower, at + 2) && isLetter(lower, at + 3)) return true;
  }
  return false;
}

function isLetter(lower: string, at: number): boolean {
  const code = lower.charCodeAt(at);
  return code >= 97 && code <= 122;
}

/** Genitives of constellations after the first word, in one word or in two, to three letters. */
function shortenGenitives(words: readonly string[]): string[] {
  const short: string[] = words.slice(0, 1);
  for (let at = 1; at < words.length; at += 1) {
    const word = words[at] ?? '';
    const pair = DOUBLE_GENITIVES.has(word) ? GENITIVES.get(`${word} ${words[at + 1] ?? ''}`) : undefined;
    short.push(pair ?? GENITIVES.get(word) ?? word);
    if (pair !== undefined) at += 1;
  }
  return short;
}

/** Blanks beside a digit or a sign go, except between two digits, where they keep two numbers apart. */
function dropBlanks(lower: string): string {
  let key = '';
  let from = 0;
  for (let at = lower.indexOf(' '); at >= 0; at = lower.indexOf(' ', at + 1)) {
    const before = lower.charCodeAt(at - 1);
    const after = lower.charCodeAt(at + 1);
    if (isSign(before) || isSign(after) || isDigit(before) !== isDigit(after)) {
      key += lower.slice(from, at);
      from = at + 1;
    }
  }
  return from === 0 ? lower : key + lower.slice(from);
}

function isSign(code: number): boolean {
  return code === 45 || code === 43;
}

/** What may be evened out because the family is known by its form: sequences, counted and zone families. */
function evenFamily(key: string): string {
  const sequence = /^(\d{0,2}[a-z]+(?: [a-z]+)*)(\d+)((?:[a-z][a-z0-9]*(?: [a-z]+)*)?)$/.exec(key);
  if (sequence) return evenSequence(key, sequence[1] ?? '', sequence[2] ?? '', sequence[3] ?? '');
  const numbers = /^([a-z]+)([-+]?\d[-+ \d]*[a-z]?)$/.exec(key);
  if (!numbers) return key;
  const [, acronym = '', rest = ''] = numbers;
  if (COUNTED_FAMILIES.has(acronym) && /^[-+]?\d+(?:-\d+)+[a-z]?$/.test(rest)) {
    return acronym + rest.replace(/(?<!\d)0+(?=\d)/g, '');
  }
  const zone = ZONE_SPELLINGS.get(acronym);
  return zone !== undefined && /^[-+]\d+ \d/.test(rest) ? zone + rest : key;
}

function evenSequence(key: string, acronym: string, digits: string, suffix: string): string {
  if (digits.length > MAX_SEQUENCE_DIGITS) return key;
  // 'J0034' or 'PSR B0531' is the beginning of a coordinate, where every zero counts.
  if (digits.length >= MIN_COORDINATE_DIGITS && /(?:j|(?:^| )[bg])$/.test(acronym)) return key;
  return (ACRONYM_SPELLINGS.get(acronym) ?? acronym) + digits.replace(/^0+(?=\d)/, '') + suffix;
}
