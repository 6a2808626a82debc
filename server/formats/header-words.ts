import type { ColumnMapping } from '../../shared/schemas/mapping';
import { readHeaderUnit, type HeaderUnit } from './header-units';

/** What a header word says that a column holds. */
export type HeaderRole =
  | 'ra'
  | 'dec'
  | 'position'
  | 'position-error'
  | 'error-major'
  | 'error-minor'
  | 'error-pa'
  | 'pm-ra'
  | 'pm-dec'
  | 'magnitude'
  | 'flux'
  | 'redshift'
  | 'velocity'
  | 'name'
  | 'key'
  | 'no-name';

export interface HeaderMeaning {
  /** Null: no known word. */
  role: HeaderRole | null;
  /** True for the error of what the role says. */
  isError: boolean;
  unit: HeaderUnit | null;
  /** Band of a magnitude or flux as written; 'unstated' when the header names none; '' for other roles. */
  band: string;
  /** What a positional error says it means. */
  meaning: NonNullable<Extract<ColumnMapping['error'], { kind: 'circle' }>>['meaning'];
  /** True when the word names equinox 1950. */
  is1950: boolean;
}

/** What is longer is a sentence; the patterns below are for words. */
const MAX_HEADER_LENGTH = 80;

const ERROR_WORD = '(?:e|err|error|errors|sigma|sig|unc|uncertainty|std|rms)';
const ERROR_FIRST = new RegExp(`^${ERROR_WORD}[\\s_.]+(?:of[\\s_.]+)?(.+)$`, 'i');
const ERROR_LAST = new RegExp(`^(.+?)[\\s_.]+${ERROR_WORD}$`, 'i');
const ERROR_GLUED_FIRST = /^(?:err|error|sigma|sig)([a-z].*)$/i;
const ERROR_GLUED_LAST = /^(.+?)(?:err|error|sigma|unc)$/i;

const YEARS =
  /(?:icrs|fk[45]|[jb]?(?:1950|2000)(?:\.?0)?|j?20\d\d(?:\.\d+)?|j?1991(?:\.25)?|ep(?:och)?\d{4})$/i;
const PLACE = '(?:mean|avg|average|median|obs|observed|source|src|cat|object|obj|best|opt|radio|xray|ir)?';

const ROLES: readonly (readonly [HeaderRole, RegExp])[] = [
  ['ra', new RegExp(`^${PLACE}(?:ra|raj|rab|rasc|rightascension|rightasc|alpha)${PLACE}$`)],
  ['dec', new RegExp(`^${PLACE}(?:de|dec|dej|decj|deb|decb|decl|declination|delta)${PLACE}$`)],
  ['position', /^(?:pos|position|coords?|coordinates?|radec|skyposition)$/],
  ['pm-ra', /^(?:(?:pm|mu|propermotion|motion)(?:in)?(?:ra|alpha|a)(?:cosde?c?|star|s)?|ra(?:pm|mu))$/],
  ['pm-dec', /^(?:(?:pm|mu|propermotion|motion)(?:in)?(?:dec?|delta|d|decl)|dec?(?:pm|mu))$/],
  ['redshift', /^(?:z|redshift|z?spec|zsp|zspectro|zph|zphot|zbest|zhelio|zcmb|specz|photoz)$/],
  ['velocity', /^(?:rv|vr|vrad|radvel|radialvelocity|cz|hrv|vhel|vhelio|vlsr|velocity|vel|rvel)$/],
  [
    'no-name',
    /type|class|^sp$|spt|morph|note|remark|comment|^refs?$|bib|flag|qual|date|epoch|const|filter|survey|tele|instr|code/,
  ],
  [
    'name',
    /^(?:names?|.*names?|designations?|desig|ident|identifiers?|objects?|obj|star|source|src|target|alias|aliases|aka|mainid)$/,
  ],
  ['key', /^(?:.*id|recno|rec|key|no|nr|num|number|seq|index|idx|row|entry|catalog(?:ue)?number|objno)$/],
];

const COLOUR = /^\(?[a-z][a-z0-9']{0,3}\s*[-–−]\s*[a-z][a-z0-9']{0,3}\)?(?:[\s_]*(?:colou?r|mag))?$/i;
const NO_MAGNITUDE = /abs|lim|delta|type|flag|ref|system|num|^n$|^n_|colou?r|corr|ext/i;
const BAND_LETTERS = /^(?:[UBVRIJHKGugriy]|Ks|BP|RP|NUV|FUV|W[1-4])$/;
const MAGNITUDE: readonly RegExp[] = [
  /^(.*?)[\s_.]*(?:mag|mags|magnitude|mpro)$/i,
  /^(?:mag|magnitude)[\s_.]*(.+)$/i,
  /^m[\s_]([a-z][a-z0-9']{0,5})$/i,
];
const FLUX: readonly RegExp[] = [
  /^(?:(.*?)[\s_.]*)(?:flux|fluxes|fluxdensity|flux[\s_]density)$/i,
  /^(?:flux|f)[\s_.]+(.+)$/i,
  /^flux(\d.*)$/i,
  /^[sf][\s_.]?(\d[\d.]+\s*(?:[mg]hz|um|cm)?)$/i,
  /^[sf][\s_]?(peak|int|tot|total)$/i,
];

/** Reads a header cell: 'RA [deg]', 'e_RAJ2000', 'pmRA (mas/yr)', 'Vmag', 'flux_1400', 'pos_err_95', … */
export function readHeader(text: string): HeaderMeaning {
  const { word, unit } = text.length > MAX_HEADER_LENGTH ? { word: '', unit: null } : readHeaderUnit(text);
  const meaning: HeaderMeaning = {
    role: null,
    isError: false,
    unit,
    band: '',
    meaning: 'sigma',
    is1950: false,
  };
  const positionError = readPositionError(word, meaning);
  if (positionError !== null) return positionError;
  // An error word that stands apart is read before the rest: 'e_Vmag' is no magnitude of a band 'e_V'.
  const inner = errorOf(word, [ERROR_FIRST, ERROR_LAST], meaning);
  if (inner !== null) return inner;
  const whole = roleOf(word, meaning);
  if (whole.role !== null && whole.role !== 'no-name') return whole;
  return errorOf(word, [ERROR_GLUED_FIRST, ERROR_GLUED_LAST], meaning) ?? whole;
}

function errorOf(word: string, patterns: readonly RegExp[], meaning: HeaderMeaning): HeaderMeaning | null {
  for (const pattern of patterns) {
    const base = pattern.exec(word)?.[1];
    if (base === undefined) continue;
    const inner = roleOf(readHeaderUnit(base).word, meaning);
    if (inner.role !== null && inner.role !== 'no-name') return { ...inner, isError: true };
  }
  return null;
}

function roleOf(word: string, meaning: HeaderMeaning): HeaderMeaning {
  const bare = word.replace(/^[\s_.]+|[\s_.]+$/g, '');
  const is1950 = /1950/.test(bare);
  const compact = (bare.replace(YEARS, '') || bare).toLowerCase().replace(/[^a-z0-9]/g, '');
  if (compact === '' || COLOUR.test(bare)) return meaning;
  const position = ROLES.slice(0, 5).find(([, pattern]) => pattern.test(compact));
  if (position !== undefined) return { ...meaning, role: position[0], is1950 };
  const photometry = photometryOf(bare);
  if (photometry !== null) return { ...meaning, ...photometry };
  const other = ROLES.slice(5).find(([, pattern]) => pattern.test(compact));
  return other === undefined ? meaning : { ...meaning, role: other[0] };
}

function photometryOf(word: string): Pick<HeaderMeaning, 'role' | 'band'> | null {
  if (BAND_LETTERS.test(word)) return { role: 'magnitude', band: word };
  const flux = firstBand(word, FLUX);
  if (flux !== null) return { role: 'flux', band: flux };
  const magnitude = firstBand(word, MAGNITUDE);
  return magnitude === null || NO_MAGNITUDE.test(magnitude) ? null : { role: 'magnitude', band: magnitude };
}

function firstBand(word: string, patterns: readonly RegExp[]): string | null {
  for (const pattern of patterns) {
    const match = pattern.exec(word);
    if (match === null) continue;
    const band = (match[1] ?? '')
      .replace(/phot|mean|\bapparent\b|app/gi, '')
      .replace(/^[\s_.]+|[\s_.]+$/g, '');
    return band === '' ? 'unstated' : band.slice(0, 30);
  }
  return null;
}

const ERROR_PART = '(?:e|err|error|sig|sigma|unc|uncertainty|std|rms)';
const CIRCLE_PART = '(?:r|rad|radius|circle)';
const PLACE_PART = '(?:pos|position|positional|radec|coord|coords|astrom|astrometric|centroid)';
const POSITION_ERROR = new RegExp(
  `^${ERROR_PART}?${CIRCLE_PART}?${PLACE_PART}?${ERROR_PART}?${CIRCLE_PART}?${ERROR_PART}?$`,
);
const HAS_ERROR_WORD = /err|sig|unc|^e(?:pos|r|rad|radius|radec|coord)|std|rms/;

/** Errors of the position as a whole: a circle ('pos_err', 'r95') or an ellipse ('err_maj', 'err_min', 'err_pa'). */
function readPositionError(word: string, meaning: HeaderMeaning): HeaderMeaning | null {
  const lower = word.toLowerCase();
  const share = /(?<!\d)(50|68|90|95|99)(?!\d)/.exec(lower)?.[1] ?? null;
  const compact = lower.replace(/(?<!\d)(?:50|68|90|95|99)(?!\d)/, '').replace(/[^a-z0-9]/g, '');
  const stated = { ...meaning, meaning: meaningOfShare(share) };
  const hasErrorWord = HAS_ERROR_WORD.test(compact);
  if (
    compact !== '' &&
    POSITION_ERROR.test(compact) &&
    (hasErrorWord || (share !== null && compact === 'r'))
  ) {
    return { ...stated, role: 'position-error' };
  }
  if (!hasErrorWord) return null;
  const axis = compact.replace(/err(?:or)?s?|ellipse|ell|axis|semi|half|sig(?:ma)?|unc|pos(?:ition)?/g, '');
  if (/^(?:maj|major|a|smaj)$/.test(axis)) return { ...stated, role: 'error-major' };
  if (/^(?:min|minor|b|smin)$/.test(axis)) return { ...stated, role: 'error-minor' };
  if (/^(?:pa|ang|angle|theta|posang)$/.test(axis)) return { ...stated, role: 'error-pa' };
  return null;
}

function meaningOfShare(share: string | null): HeaderMeaning['meaning'] {
  switch (share) {
    case '50':
      return 'r50';
    case '68':
      return 'r68';
    case '90':
      return 'r90';
    case '95':
      return 'r95';
    case '99':
      return 'r99';
    default:
      return 'sigma';
  }
}
