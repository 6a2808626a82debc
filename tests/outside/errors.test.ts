import { describe, it } from 'vitest';
import {
  covarianceOfAxes,
  covarianceOfCircle,
  covarianceOfEllipse,
  ellipseOfCovariance,
  normalisedSeparation,
  raErrorArcsec,
  radiusOfShareArcsec,
  scaledCovariance,
  shareBeyond,
  shareWithinRadius,
  sigmaOfShareArcsec,
  sumCovariance,
  type Covariance,
} from '../../shared/astro/errors';
import { checkValues, expectAsGiven, numberInput, numbersInput, type CheckValue } from './check-values';

function ellipseInput(entry: CheckValue): Covariance {
  return covarianceOfEllipse(
    numberInput(entry, 'majArcsec'),
    numberInput(entry, 'minArcsec'),
    numberInput(entry, 'paDeg'),
  );
}

describe('circular errors', () => {
  it.each(checkValues('rayleigh-'))('%s', (_, entry) => {
    const rArcsec = radiusOfShareArcsec(numberInput(entry, 'p'), numberInput(entry, 'sigmaArcsec'));
    expectAsGiven(entry, { rArcsec });
  });

  it.each(checkValues('rconv-'))('%s', (_, entry) => {
    const sigmaArcsec = sigmaOfShareArcsec(numberInput(entry, 'radiusArcsec'), numberInput(entry, 'p'));
    expectAsGiven(entry, { sigmaArcsec });
  });

  it.each(checkValues('share-'))('%s', (_, entry) => {
    expectAsGiven(entry, {
      p: shareWithinRadius(numberInput(entry, 'radiusArcsec'), numberInput(entry, 'sigmaArcsec')),
    });
  });

  it.each(checkValues('rasec-'))('%s', (_, entry) => {
    const sigma = raErrorArcsec(numberInput(entry, 'sigmaRaSeconds'), numberInput(entry, 'decDeg'));
    expectAsGiven(entry, { sigmaRaCosDecArcsec: sigma });
  });
});

describe('error ellipses', () => {
  it.each(checkValues('ellipse-'))('%s', (_, entry) => {
    expectAsGiven(entry, { ...ellipseInput(entry) });
  });

  it.each(checkValues('cov2ell-'))('%s', (_, entry) => {
    const [xx, yy, xy] = ['xx', 'yy', 'xy'].map((name) => numberInput(entry, name)) as [
      number,
      number,
      number,
    ];
    expectAsGiven(entry, { ...ellipseOfCovariance({ xx, yy, xy }) });
  });

  it.each(checkValues('errcorr-'))('%s', (_, entry) => {
    const covariance = covarianceOfAxes(
      numberInput(entry, 'sigmaRaCosDecArcsec'),
      numberInput(entry, 'sigmaDecArcsec'),
      numberInput(entry, 'correlation'),
    );
    expectAsGiven(entry, { ...covariance, ...ellipseOfCovariance(covariance) });
  });

  it.each(checkValues('combine-'))('%s', (_, entry) => {
    const [first, second] = ['first', 'second'].map((name) => {
      const [maj = NaN, min = NaN, pa = NaN] = numbersInput(entry, name);
      return covarianceOfEllipse(maj, min, pa);
    });
    const sum = sumCovariance(first as Covariance, second as Covariance);
    expectAsGiven(entry, {
      ...ellipseOfCovariance(scaledCovariance(sum, 1, numberInput(entry, 'floorArcsec'))),
    });
  });
});

describe('normalised separation', () => {
  it.each(checkValues('mahalanobis-'))('%s', (_, entry) => {
    const covariance = sumCovariance(
      ellipseInput(entry),
      covarianceOfCircle(numberInput(entry, 'otherSigmaArcsec')),
    );
    const [east, north] = [numberInput(entry, 'dxEastArcsec'), numberInput(entry, 'dyNorthArcsec')];
    expectAsGiven(entry, { normalisedSep: normalisedSeparation(east, north, covariance) });
  });

  it.each(checkValues('normsep-'))('%s', (_, entry) => {
    const covariance = sumCovariance(
      covarianceOfCircle(numberInput(entry, 'sigma1Arcsec')),
      covarianceOfCircle(numberInput(entry, 'sigma2Arcsec')),
    );
    const normalisedSep = normalisedSeparation(numberInput(entry, 'sepArcsec'), 0, covariance);
    expectAsGiven(entry, { normalisedSep, tailProbability: shareBeyond(normalisedSep) });
  });
});
