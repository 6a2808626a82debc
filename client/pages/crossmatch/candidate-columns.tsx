import { Link } from 'react-router-dom';
import type { Candidate } from '../../../shared/schemas/run';
import { formatAngle, formatFixed, formatSepArcsec } from '../../components/quantities';
import { Ruler } from '../../components/ruler';
import type { Column } from '../../components/table-column';
import { CandidateVerdict, SideName } from '../../components/candidate-parts';

/** Columns of a table of candidates; `addressOf` gives the place on the desk. */
export function candidateColumns({
  radiusArcsec,
  addressOf,
}: {
  radiusArcsec: number;
  addressOf: (seq: number) => string;
}): Column<Candidate>[] {
  return [
    {
      id: 'seq',
      header: 'No.',
      explain: 'Number of the candidate in this cross-match, in the order of separation',
      numeric: true,
      widthPx: 76,
      cell: ({ seq }) => (
        <Link
          to={addressOf(seq)}
          onClick={(event) => event.stopPropagation()}
          className="text-link"
          aria-label={`Candidate ${seq} on the desk`}
        >
          {seq}
        </Link>
      ),
      text: ({ seq }) => String(seq),
    },
    {
      id: 'a',
      header: 'A',
      widthPx: 190,
      cell: ({ a }) => <SideName side={a} />,
      text: ({ a }) => a.designation,
    },
    {
      id: 'b',
      header: 'B',
      widthPx: 190,
      cell: ({ b }) => <SideName side={b} />,
      text: ({ b }) => b.designation,
    },
    {
      id: 'sep',
      header: 'Separation',
      numeric: true,
      sortable: true,
      widthPx: 110,
      cell: ({ sepArcsec }) => formatSepArcsec(sepArcsec),
      text: ({ sepArcsec }) => String(sepArcsec),
    },
    {
      id: 'ruler',
      header: '0.01″ to 10′',
      explain: 'The separation on the ruler, with the radius of the run',
      widthPx: 150,
      cell: ({ sepArcsec }) => <Ruler compact marks={[{ sepArcsec }]} limitArcsec={radiusArcsec} />,
      text: () => '',
    },
    {
      id: 'verdict',
      header: 'Verdict',
      widthPx: 220,
      cell: ({ verdict }) => <CandidateVerdict verdict={verdict} />,
      text: ({ verdict }) => verdict?.value ?? '',
    },
    {
      id: 'pa',
      header: 'PA',
      unit: '°',
      explain: 'Position angle from A to B, degrees east of north',
      numeric: true,
      widthPx: 76,
      cell: ({ paDeg }) => (paDeg === null ? '–' : formatFixed(paDeg, 1)),
    },
    {
      id: 'ranks',
      header: 'Ranks',
      explain: 'Rank of B among the candidates of A, and of A among those of B; 1 is the nearest',
      widthPx: 76,
      cell: ({ rankA, rankB }) => `${rankA} / ${rankB}`,
    },
    {
      id: 'rivals',
      header: 'Rivals',
      explain: 'Other candidates of A, and of B, inside the radius',
      widthPx: 76,
      cell: ({ rivalsA, rivalsB }) => `${rivalsA} / ${rivalsB}`,
    },
    {
      id: 'mutual',
      header: 'Mutual best',
      widthPx: 100,
      cell: ({ mutualBest }) => (mutualBest ? 'yes' : 'no'),
    },
    {
      id: 'objects',
      header: 'Objects',
      hidden: true,
      widthPx: 110,
      cell: ({ a, b }) => `${objectText(a.objectNumber)} / ${objectText(b.objectNumber)}`,
    },
    {
      id: 'place',
      header: 'Place of A',
      unit: '°',
      hidden: true,
      widthPx: 190,
      cell: ({ a }) => `${formatFixed(a.raDeg, 6)} ${formatAngle(a.decDeg, 6).replace('°', '')}`,
    },
  ];
}

function objectText(objectNumber: number | null): string {
  return objectNumber === null ? '–' : String(objectNumber);
}
