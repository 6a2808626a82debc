/** Units that headers state, by what they mean for a mapping. */
export type HeaderUnit =
  | { kind: 'angle'; unit: 'deg' | 'arcmin' | 'arcsec' | 'mas' }
  | { kind: 'hours' }
  | { kind: 'sexagesimal'; unit: 'hours' | 'degrees' }
  | { kind: 'time-second' }
  | { kind: 'motion'; unit: 'mas/yr' | 'arcsec/yr' }
  | { kind: 'other'; text: string };

const UNITS: readonly (readonly [RegExp, HeaderUnit])[] = [
  [/^(?:deg|degs|degrees?|°|decimaldegrees?|ddeg)$/, { kind: 'angle', unit: 'deg' }],
  [/^(?:arcmin|arcmins|arcminutes?|amin|'|′)$/, { kind: 'angle', unit: 'arcmin' }],
  [/^(?:arcsec|arcsecs|arcseconds?|asec|as|"|″|'')$/, { kind: 'angle', unit: 'arcsec' }],
  [/^(?:mas|milliarcsec|milliarcseconds?)$/, { kind: 'angle', unit: 'mas' }],
  [/^(?:h|hr|hrs|hours?|decimalhours?)$/, { kind: 'hours' }],
  [
    /^(?:hms|h:m:s|hh:mm:ss(?:\.s+)?|hhmmss|hmmss|hourangle|"h:m:s")$/,
    { kind: 'sexagesimal', unit: 'hours' },
  ],
  [/^(?:dms|d:m:s|dd:mm:ss(?:\.s+)?|ddmmss|"d:m:s")$/, { kind: 'sexagesimal', unit: 'degrees' }],
  [/^(?:s|sec|secs|seconds?|timeseconds?)$/, { kind: 'time-second' }],
  [/^(?:mas|milliarcsec)[/.*]?(?:yr|year|a|y)(?:\^|\*\*)?(?:-1)?$/, { kind: 'motion', unit: 'mas/yr' }],
  [/^(?:arcsec|asec|as|"|″)[/.*]?(?:yr|year|a|y)(?:\^|\*\*)?(?:-1)?$/, { kind: 'motion', unit: 'arcsec/yr' }],
];
/** Words at the end of a header, after a blank or '_', that are units; others need brackets. */
const UNIT_WORDS =
  /^(.+?)[\s_]+(deg|degs|degrees?|hours?|hrs?|hms|dms|arcmin|arcsec|asec|mas|(?:mas|arcsec|asec)[\s_]?(?:per[\s_]?)?yr|[mu]?jy|km[\s_]?s)$/i;
const GLUED = /^((?:_?ra|de|dec)(?:j?2000|_?icrs)?)(deg|h|hms|dms)$/i;
const BRACKETS = /^(.*?)\s*[[({]\s*([^\])}]*?)\s*[\])}]\s*$/;

/** Cuts the unit off a header: 'RA [deg]' -> 'RA' and degrees. What stands in brackets and is no unit is dropped. */
export function readHeaderUnit(header: string): { word: string; unit: HeaderUnit | null } {
  const text = header.trim();
  const bracketed = BRACKETS.exec(text);
  if (bracketed !== null && (bracketed[1] ?? '') !== '') {
    const [, word = '', inside = ''] = bracketed;
    const isEpoch = /^[jb]?\d{4}(?:\.\d+)?$|^icrs$|^fk[45]$/i.test(inside);
    return { word, unit: isEpoch || inside === '' ? null : unitOf(inside) };
  }
  for (const pattern of [UNIT_WORDS, GLUED]) {
    const [, word, unit] = pattern.exec(text) ?? [];
    if (word !== undefined && unit !== undefined) return { word, unit: unitOf(unit) };
  }
  const hours = /^(_?ra[a-z0-9]*)_h$/i.exec(text)?.[1];
  return hours === undefined ? { word: text, unit: null } : { word: hours, unit: { kind: 'hours' } };
}

function unitOf(text: string): HeaderUnit {
  const compact = text.toLowerCase().replace(/[\s_]/g, '').replace(/per/g, '/');
  return UNITS.find(([pattern]) => pattern.test(compact))?.[1] ?? { kind: 'other', text };
}
