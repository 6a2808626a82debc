import { describe, expect, it } from 'vitest';
import { newVerdict } from '../../../shared/schemas/verdict';
import { draftOfVerdict, EMPTY_DRAFT, verdictOfDraft, withFlag, withGrade } from './verdict-draft';

const side = (entryId: number) => ({
  catalogue: 'LAN-O',
  ordinal: 0,
  entryId,
  rowNo: 1,
  designation: 'x',
  raDeg: 10,
  decDeg: 0,
  errMajArcsec: null,
  errMinArcsec: null,
  errPaDeg: null,
  objectNumber: 1,
});

describe('a verdict before it is given', () => {
  it('takes a grade away when it is chosen again, and changes it otherwise', () => {
    const certain = withGrade(EMPTY_DRAFT, 'certain');
    expect(certain.grade).toBe('certain');
    expect(withGrade(certain, 'possible').grade).toBe('possible');
    expect(withGrade(certain, 'certain').grade).toBeNull();
  });

  it('puts flags on and off one by one', () => {
    const two = withFlag(withFlag(EMPTY_DRAFT, 'blend'), 'variable');
    expect(two.flags).toEqual(['blend', 'variable']);
    expect(withFlag(two, 'blend').flags).toEqual(['variable']);
  });

  it('is sent as the contract wants it', () => {
    const draft = withFlag({ grade: 'probable', flags: [], remark: '  near a bright star ' }, 'blend');
    const body = verdictOfDraft({ a: side(4), b: side(9) }, 'unsure', draft, 3);
    expect(newVerdict.parse(body)).toEqual({
      entryA: 4,
      entryB: 9,
      value: 'unsure',
      grade: 'probable',
      flags: ['blend'],
      remark: 'near a bright star',
      run: 3,
    });
  });

  it('comes back as it was typed when the verdict is taken back', () => {
    const draft = withFlag({ grade: 'possible', flags: [], remark: 'two in the beam' }, 'blend');
    expect(draftOfVerdict(verdictOfDraft({ a: side(4), b: side(9) }, 'same', draft, 3))).toEqual(draft);
  });
});
