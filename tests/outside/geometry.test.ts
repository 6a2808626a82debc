import { describe, expect, it } from 'vitest';
import {
  cosDeg,
  midpoint,
  offsetPosition,
  positionAngleDeg,
  positionAtTangentOffset,
  positionOfVector,
  raHalfWidthDeg,
  separationArcsec,
  tangentOffset,
  unitVector,
  type SkyPosition,
} from '../../shared/astro/sphere';
import { ARCSEC_PER_RAD, DEG_PER_RAD, RAD_PER_ARCSEC, RAD_PER_DEG } from '../../shared/astro/units';
import { checkValues, expectAsGiven, numberInput, numbersInput, type CheckValue } from './check-values';

/** The two positions of an entry, given in degrees or in radians. */
function twoPositions(entry: CheckValue): [number, number, number, number] {
  const names = ['ra1', 'dec1', 'ra2', 'dec2'];
  const inRadians = 'ra1Rad' in entry.inputs;
  const values = names.map((name) =>
    inRadians ? numberInput(entry, `${name}Rad`) * DEG_PER_RAD : numberInput(entry, `${name}Deg`),
  );
  return values as [number, number, number, number];
}

function directionOf(entry: CheckValue, name: string): SkyPosition {
  const [x = NaN, y = NaN, z = NaN] = numbersInput(entry, name);
  return positionOfVector([x, y, z]) ?? { raDeg: NaN, decDeg: NaN };
}

describe('angular separation', () => {
  it.each(checkValues('sep-', 'meeus-17', 'sofa-seps'))('%s', (_, entry) => {
    const sepArcsec = separationArcsec(...twoPositions(entry));
    expectAsGiven(entry, { sepArcsec, sepDeg: sepArcsec / 3600, sepRad: sepArcsec * RAD_PER_ARCSEC });
  });

  it.each(checkValues('sofa-sepp'))('%s', (_, entry) => {
    const [a, b] = [directionOf(entry, 'a'), directionOf(entry, 'b')];
    const sepRad = separationArcsec(a.raDeg, a.decDeg, b.raDeg, b.decDeg) * RAD_PER_ARCSEC;
    expectAsGiven(entry, { sepRad });
  });

  it.each(checkValues('flat-'))('%s: the true separation is the flat one less its error', (_, entry) => {
    const [ra1, dec1, ra2, dec2] = twoPositions(entry);
    const flatArcsec = Math.hypot((ra2 - ra1) * cosDeg((dec1 + dec2) / 2), dec2 - dec1) * 3600;
    expectAsGiven(entry, { flatArcsec, errorArcsec: flatArcsec - separationArcsec(ra1, dec1, ra2, dec2) });
  });
});

describe('position angle', () => {
  it.each(checkValues('pa-'))('%s', (_, entry) => {
    const paDeg = positionAngleDeg(...twoPositions(entry));
    // 359.99999999 and 0 are one direction.
    const wanted = entry.expected.paDeg;
    const near = typeof wanted === 'number' && paDeg !== null && paDeg - wanted > 180 ? paDeg - 360 : paDeg;
    expectAsGiven(entry, { paDeg: near });
  });

  it.each(checkValues('sofa-pas'))('%s', (_, entry) => {
    expectAsGiven(entry, { paRad: signedRadians(positionAngleDeg(...twoPositions(entry))) });
  });

  it.each(checkValues('sofa-pap'))('%s', (_, entry) => {
    const [a, b] = [directionOf(entry, 'a'), directionOf(entry, 'b')];
    expectAsGiven(entry, { paRad: signedRadians(positionAngleDeg(a.raDeg, a.decDeg, b.raDeg, b.decDeg)) });
  });
});

/** 0..360 degrees to -pi..pi, as these sources give it. */
function signedRadians(paDeg: number | null): number {
  const deg = paDeg ?? NaN;
  return (deg > 180 ? deg - 360 : deg) * RAD_PER_DEG;
}

describe('tangent plane', () => {
  it.each(checkValues('tan-'))('%s', (_, entry) => {
    const offset = tangentOffset(
      { raDeg: numberInput(entry, 'raDeg'), decDeg: numberInput(entry, 'decDeg') },
      { raDeg: numberInput(entry, 'ra0Deg'), decDeg: numberInput(entry, 'dec0Deg') },
    );
    expectAsGiven(entry, { ...offset });
  });

  it.each(checkValues('detan-'))('%s', (_, entry) => {
    const position = positionAtTangentOffset(
      { xiArcsec: numberInput(entry, 'xiArcsec'), etaArcsec: numberInput(entry, 'etaArcsec') },
      { raDeg: numberInput(entry, 'ra0Deg'), decDeg: numberInput(entry, 'dec0Deg') },
    );
    expectAsGiven(entry, { ...position });
  });

  it.each(checkValues('sofa-tpxes'))('%s', (_, entry) => {
    const offset = tangentOffset(
      radianPosition(entry, 'raRad', 'decRad'),
      radianPosition(entry, 'ra0Rad', 'dec0Rad'),
    );
    expectAsGiven(entry, {
      xiRad: (offset?.xiArcsec ?? NaN) * RAD_PER_ARCSEC,
      etaRad: (offset?.etaArcsec ?? NaN) * RAD_PER_ARCSEC,
    });
  });

  it.each(checkValues('sofa-tpsts'))('%s', (_, entry) => {
    const position = positionAtTangentOffset(
      {
        xiArcsec: numberInput(entry, 'xiRad') * ARCSEC_PER_RAD,
        etaArcsec: numberInput(entry, 'etaRad') * ARCSEC_PER_RAD,
      },
      radianPosition(entry, 'ra0Rad', 'dec0Rad'),
    );
    expectAsGiven(entry, { raRad: position.raDeg * RAD_PER_DEG, decRad: position.decDeg * RAD_PER_DEG });
  });
});

function radianPosition(entry: CheckValue, ra: string, dec: string): SkyPosition {
  return { raDeg: numberInput(entry, ra) * DEG_PER_RAD, decDeg: numberInput(entry, dec) * DEG_PER_RAD };
}

describe('other places on the sphere', () => {
  it.each(checkValues('offset-'))('%s', (_, entry) => {
    const from = { raDeg: numberInput(entry, 'raDeg'), decDeg: numberInput(entry, 'decDeg') };
    const moved = offsetPosition(from, numberInput(entry, 'distanceArcsec'), numberInput(entry, 'paDeg'));
    expectAsGiven(entry, { ...moved });
  });

  it.each(checkValues('unit-'))('%s', (_, entry) => {
    const [x, y, z] = unitVector(numberInput(entry, 'raDeg'), numberInput(entry, 'decDeg'));
    expectAsGiven(entry, { x, y, z });
  });

  it.each(checkValues('rahalf-'))('%s', (_, entry) => {
    const half = raHalfWidthDeg(numberInput(entry, 'rArcsec'), numberInput(entry, 'decDeg'));
    expectAsGiven(entry, { raHalfWidthDeg: half });
  });

  it.each(checkValues('uvmean-1'))('%s: the mean of two equal ones is the midpoint', (_, entry) => {
    const [one, two] = (entry.inputs.positionsRaDecSigma as [number, number, number][]).map(
      ([raDeg, decDeg]) => ({
        raDeg,
        decDeg,
      }),
    );
    expect(one && two).toBeDefined();
    expectAsGiven(entry, { ...(one && two ? midpoint(one, two) : null) });
  });
});
