import { describe, expect, it } from 'vitest';
import { readHeader } from './header-words';

/** Header words as catalogues commonly write them: common practice, no source. */
const roles: readonly (readonly [string, string | null])[] = [
  ['RA', 'ra'],
  ['RAJ2000', 'ra'],
  ['_RAJ2000', 'ra'],
  ['ra_deg', 'ra'],
  ['RA [deg]', 'ra'],
  ['RA (J2000)', 'ra'],
  ['ra_hours', 'ra'],
  ['Right Ascension', 'ra'],
  ['alpha', 'ra'],
  ['DEJ2000', 'dec'],
  ['Dec.', 'dec'],
  ['delta', 'dec'],
  ['Declination (deg)', 'dec'],
  ['ra dec', 'position'],
  ['pmRA (mas/yr)', 'pm-ra'],
  ['pmra_cosdec', 'pm-ra'],
  ['mu_delta', 'pm-dec'],
  ['pmDE', 'pm-dec'],
  ['Vmag', 'magnitude'],
  ['Ks', 'magnitude'],
  ['mag', 'magnitude'],
  ['B-V', null],
  ['absmag', null],
  ['flux_1400', 'flux'],
  ['z', 'redshift'],
  ['RV', 'velocity'],
  ['names', 'name'],
  ['other_name', 'name'],
  ['source_id', 'key'],
  ['recno', 'key'],
  ['SpType', 'no-name'],
  ['epoch', 'no-name'],
  ['pos_err', 'position-error'],
  ['error_radius', 'position-error'],
  ['r95', 'position-error'],
  ['err_maj', 'error-major'],
  ['err_min', 'error-minor'],
  ['err_pa', 'error-pa'],
  ['radius', null],
  ['maj_arcmin', null],
  ['eso', null],
  ['decision', null],
  ['range', null],
];

describe('header words', () => {
  it.each(roles)('“%s” is %s', (text, role) => {
    expect(readHeader(text)).toMatchObject({ role, isError: false });
  });

  it.each([
    ['e_RAJ2000', 'ra'],
    ['ra_error', 'ra'],
    ['raErr', 'ra'],
    ['sigma_dec', 'dec'],
    ['e_Vmag', 'magnitude'],
    ['Vmag_err', 'magnitude'],
    ['flux_1400_err', 'flux'],
    ['z_err', 'redshift'],
    ['e_pmRA', 'pm-ra'],
  ])('“%s” is the error of %s', (text, role) => {
    expect(readHeader(text)).toMatchObject({ role, isError: true });
  });

  it('tells units', () => {
    expect(readHeader('RA [deg]').unit).toEqual({ kind: 'angle', unit: 'deg' });
    expect(readHeader('RAdeg').unit).toEqual({ kind: 'angle', unit: 'deg' });
    expect(readHeader('ra_hours').unit).toEqual({ kind: 'hours' });
    expect(readHeader('RA (hms)').unit).toEqual({ kind: 'sexagesimal', unit: 'hours' });
    expect(readHeader('RA (J2000)').unit).toBeNull();
    expect(readHeader('e_RA [mas]').unit).toEqual({ kind: 'angle', unit: 'mas' });
    expect(readHeader('e_RA (s)').unit).toEqual({ kind: 'time-second' });
    expect(readHeader('pmra_masyr').unit).toEqual({ kind: 'motion', unit: 'mas/yr' });
    expect(readHeader('pmDE (arcsec/yr)').unit).toEqual({ kind: 'motion', unit: 'arcsec/yr' });
    expect(readHeader('flux (mJy)').unit).toEqual({ kind: 'other', text: 'mJy' });
  });

  it('tells bands as they are written', () => {
    expect(readHeader('Vmag').band).toBe('V');
    expect(readHeader('mag_g').band).toBe('g');
    expect(readHeader('e_Kmag').band).toBe('K');
    expect(readHeader('flux_1400').band).toBe('1400');
    expect(readHeader('mag').band).toBe('unstated');
  });

  it('tells what an error radius holds', () => {
    expect(readHeader('r95').meaning).toBe('r95');
    expect(readHeader('pos_err_90 [arcsec]')).toMatchObject({ meaning: 'r90', unit: { unit: 'arcsec' } });
    expect(readHeader('pos_err').meaning).toBe('sigma');
  });

  it('tells equinox 1950 from 2000', () => {
    expect(readHeader('RAB1950').is1950).toBe(true);
    expect(readHeader('RAJ2000').is1950).toBe(false);
  });

  it('a text longer than any header word is none, and is not searched', () => {
    for (const text of [' _.'.repeat(100_000), `${'['.repeat(100_000)}x`, 'mag'.repeat(100_000)]) {
      expect(readHeader(text)).toMatchObject({ role: null, unit: null });
    }
  });
});
