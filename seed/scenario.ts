import type { NewCatalogue } from '../shared/schemas/catalogue';

/**
 * The invented scenario: a group looks at one invented field with four invented instruments. No object, acronym
 * or number here belongs to a real survey.
 */
export const SEED = 20_161_116;

/** Centre and radius of the field, ICRS degrees. */
export const FIELD = { raDeg: 213.4, decDeg: -37.2, radiusDeg: 0.69 } as const;

export const COUNTS = {
  galaxies: 14_200,
  /** Share of the galaxies that stands in clusters. */
  clusteredShare: 0.3,
  clusters: 60,
  stars: 3_600,
  fastStars: 45,
  agn: 1_250,
  /** Pairs of galaxies that the wider instruments see as one. */
  blends: 70,
} as const;

/** The near-infrared frame is off by this much (arcsec, east and north) and turned about the field centre. */
export const NIR_SHIFT = { eastArcsec: 0.19, northArcsec: -0.16, rotationDeg: 0.0035 } as const;

export const EPOCHS = { optical: 2016.0, nir: 2010.5, radio: 2019.3, xray: 2005.2 } as const;

/** Rows that cannot be sources, put into each file on purpose. */
export const BAD_ROWS = { optical: 5, nir: 4, radio: 3, xray: 3 } as const;

export type Band = keyof typeof EPOCHS;
export const BANDS: readonly Band[] = ['optical', 'nir', 'radio', 'xray'];

type Description = Pick<NewCatalogue, 'label' | 'title' | 'band' | 'description' | 'citation' | 'epochYear' | 'mapping'> & {
  fileName: string;
};

const NO_MEASUREMENTS = { properMotion: null, photometry: [], redshift: null };

export const CATALOGUES: Record<Band, Description> = {
  optical: {
    label: 'WICK',
    title: 'Wick optical survey of the Lantern Field',
    band: 'optical',
    description: 'Invented. Point and extended sources in g, r, i; errors grow towards the faint end; motions for the brighter stars.',
    citation: 'Tannock & Brankovic (invented), Wick: an optical list of the Lantern Field',
    epochYear: EPOCHS.optical,
    fileName: 'wick-optical.csv',
    mapping: {
      position: { kind: 'two-columns', raColumn: 2, decColumn: 3, raNotation: 'degrees', decNotation: 'degrees' },
      keyColumn: 0,
      names: [{ column: 1, separator: null }],
      error: { kind: 'circle', column: 4, unit: 'arcsec', meaning: 'sigma' },
      properMotion: { raColumn: 5, decColumn: 6, unit: 'mas/yr', raIncludesCosDec: true },
      photometry: [
        { column: 7, errorColumn: null, kind: 'magnitude', band: 'g', unit: 'mag' },
        { column: 8, errorColumn: null, kind: 'magnitude', band: 'r', unit: 'mag' },
        { column: 9, errorColumn: null, kind: 'magnitude', band: 'i', unit: 'mag' },
      ],
      redshift: null,
    },
  },
  nir: {
    label: 'COAL',
    title: 'Coal near-infrared list of the Lantern Field',
    band: 'near-infrared',
    description: 'Invented. J and K; errors are 90 % radii; its frame is off by about a quarter of an arcsecond, on purpose.',
    citation: 'Achterberg (invented), Coal: near-infrared sources of the Lantern Field',
    epochYear: EPOCHS.nir,
    fileName: 'coal-near-infrared.txt',
    mapping: {
      position: {
        kind: 'two-columns',
        raColumn: 1,
        decColumn: 2,
        raNotation: 'sexagesimal-hours',
        decNotation: 'sexagesimal-degrees',
      },
      keyColumn: 0,
      names: [{ column: 0, separator: null }],
      error: { kind: 'circle', column: 3, unit: 'arcsec', meaning: 'r90' },
      ...NO_MEASUREMENTS,
      photometry: [
        { column: 4, errorColumn: null, kind: 'magnitude', band: 'J', unit: 'mag' },
        { column: 5, errorColumn: null, kind: 'magnitude', band: 'K', unit: 'mag' },
      ],
    },
  },
  radio: {
    label: 'HUM',
    title: 'Hum radio list of the Lantern Field, beam 15 arcsec',
    band: '1.4 GHz',
    description: 'Invented. A wide beam: error ellipses of about beam / (2 S/N); double sources as components A and B; blends.',
    citation: 'Vale (invented), Hum: radio sources of the Lantern Field',
    epochYear: EPOCHS.radio,
    fileName: 'hum-radio.tsv.gz',
    mapping: {
      position: { kind: 'two-columns', raColumn: 1, decColumn: 2, raNotation: 'sexagesimal-hours', decNotation: 'sexagesimal-degrees' },
      keyColumn: 0,
      names: [{ column: 0, separator: null }],
      error: { kind: 'ellipse', majorColumn: 3, minorColumn: 4, paColumn: 5, unit: 'arcsec', meaning: 'sigma' },
      ...NO_MEASUREMENTS,
      photometry: [{ column: 6, errorColumn: 7, kind: 'flux', band: '1.4 GHz', unit: 'mJy' }],
    },
  },
  xray: {
    label: 'FLINT',
    title: 'Flint X-ray list of the Lantern Field',
    band: '0.5-2 keV',
    description: 'Invented. Errors are 95 % radii that grow off axis; many rows carry a second, older name.',
    citation: 'Brankovic & Vale (invented), Flint: X-ray sources of the Lantern Field',
    epochYear: EPOCHS.xray,
    fileName: 'flint-x-ray.csv',
    mapping: {
      position: { kind: 'one-column', column: 2, raNotation: 'sexagesimal-hours', decNotation: 'sexagesimal-degrees' },
      keyColumn: 0,
      names: [{ column: 1, separator: ';' }],
      error: { kind: 'circle', column: 3, unit: 'arcsec', meaning: 'r95' },
      ...NO_MEASUREMENTS,
      photometry: [{ column: 4, errorColumn: null, kind: 'flux', band: '0.5-2 keV', unit: 'erg/s/cm2' }],
    },
  },
};

/** Some notes the demo people wrote: the rank of the object among those seen in all four bands, and the text. */
export const NOTES: readonly { rank: number; text: string }[] = [
  { rank: 0, text: 'Seen in **all four bands**. The radio position agrees with the nucleus; a good target for a spectrum.' },
  {
    rank: 1,
    text: 'Two optical sources lie within the X-ray error circle. I took the redder one:\n\n- `i - K` is large\n- the radio source points at it',
  },
  { rank: 2, text: 'The near-infrared position is off to the south-east, as for the whole field. *Not* a different object.' },
];
