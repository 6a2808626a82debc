/**
 * Closed tables behind `nameKey`. Extend them here; the rules stand in `designations.ts`.
 * Constellations: the 88 of the IAU (1928) with their three-letter forms (1922, 1932) and Latin genitives.
 */

const GREEK_TABLE = `
  α alf alpha alp | β bet beta | γ gam gamma | δ del delta | ε eps epsilon | ζ zet zeta | η eta | θ tet theta the
  ι iot iota | κ kap kappa | λ lam lambda | μ mu | ν nu | ξ xi ksi | ο omi omicron | π pi | ρ rho | σ sig sigma
  ς sig | τ tau | υ ups upsilon | φ phi | χ chi | ψ psi | ω ome omega`;

const CONSTELLATION_TABLE = `
  and andromedae | ant antliae | aps apodis | aqr aquarii | aql aquilae | ara arae | ari arietis | aur aurigae
  boo bootis | cae caeli | cam camelopardalis | cnc cancri | cvn canum_venaticorum | cma canis_majoris
  cmi canis_minoris | cap capricorni | car carinae | cas cassiopeiae | cen centauri | cep cephei | cet ceti
  cha chamaeleontis | cir circini | col columbae | com comae_berenices | cra coronae_australis
  crb coronae_borealis | crv corvi | crt crateris | cru crucis | cyg cygni | del delphini | dor doradus
  dra draconis | equ equulei | eri eridani | for fornacis | gem geminorum | gru gruis | her herculis
  hor horologii | hya hydrae | hyi hydri | ind indi | lac lacertae | leo leonis | lmi leonis_minoris
  lep leporis | lib librae | lup lupi | lyn lyncis | lyr lyrae | men mensae | mic microscopii | mon monocerotis
  mus muscae | nor normae | oct octantis | oph ophiuchi | ori orionis | pav pavonis | peg pegasi | per persei
  phe phoenicis | pic pictoris | psc piscium | psa piscis_austrini | pup puppis | pyx pyxidis | ret reticuli
  sge sagittae | sgr sagittarii | sco scorpii | scl sculptoris | sct scuti | ser serpentis | sex sextantis
  tau tauri | tel telescopii | tri trianguli | tra trianguli_australis | tuc tucanae | uma ursae_majoris
  umi ursae_minoris | vel velorum | vir virginis | vol volantis | vul vulpeculae`;

function rowsOf(table: string): string[][] {
  return table
    .split(/[|\n]/)
    .map((row) => row.trim().split(/\s+/))
    .filter((row) => row.length > 1);
}

/** Every spelling of a Greek letter in Latin letters, to its short form: 'alpha' -> 'alf'. */
export const GREEK_SPELLINGS: ReadonlyMap<string, string> = new Map(
  rowsOf(GREEK_TABLE).flatMap(([, short = '', ...spellings]) =>
    [short, ...spellings].map((spelling): [string, string] => [spelling, short]),
  ),
);

/** Greek characters to their short forms: 'α' -> 'alf'. */
export const GREEK_CHARACTERS: ReadonlyMap<string, string> = new Map(
  rowsOf(GREEK_TABLE).map(([character = '', short = '']): [string, string] => [character, short]),
);

/** Genitives, in one word or in two, to the three-letter form: 'ursae majoris' -> 'uma'. */
export const GENITIVES: ReadonlyMap<string, string> = new Map(
  rowsOf(CONSTELLATION_TABLE).map(([short = '', genitive = '']): [string, string] => [
    genitive.replace('_', ' '),
    short,
  ]),
);

/** First words of the genitives that have two. */
export const DOUBLE_GENITIVES: ReadonlySet<string> = new Set(
  [...GENITIVES.keys()]
    .filter((genitive) => genitive.includes(' '))
    .map((genitive) => genitive.split(' ')[0] ?? ''),
);

/** The three-letter forms. */
export const CONSTELLATIONS: ReadonlySet<string> = new Set(GENITIVES.values());

/** Acronyms with several spellings. Only names of the form acronym + number are touched. */
export const ACRONYM_SPELLINGS: ReadonlyMap<string, string> = new Map([
  ['messier', 'm'],
  ['markarian', 'mrk'],
  ['mkn', 'mrk'],
  ['hickson', 'hcg'],
  ['gliese', 'gl'],
]);

/** Zone catalogues with several acronyms: sign and zone stay as written. */
export const ZONE_SPELLINGS: ReadonlyMap<string, string> = new Map([['cod', 'cd']]);

/** Families of several counted numbers, each padded with zeros or not: 'ESO 137-001', 'MCG -05-23-016'. */
export const COUNTED_FAMILIES: ReadonlySet<string> = new Set(['eso', 'mcg', 'cgcg']);

/** Families of stars in which a lower-case letter after the number is a planet, an upper-case one a companion star. */
export const PLANET_FAMILIES: ReadonlySet<string> = new Set([
  'hd',
  'hip',
  'hr',
  'gj',
  'gl',
  'gliese',
  'kepler',
  'toi',
]);
