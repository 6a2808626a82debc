import { useNavigate, Link } from 'react-router-dom';
import type { ObjectDetail } from '../../../shared/schemas/object';
import { FindingChart } from '../../charts/finding-chart';
import { Loading } from '../../components/loading';
import { ProblemNotice } from '../../components/problem-notice';
import { formatSepArcsec } from '../../components/quantities';
import { Section } from '../../components/section';
import { Stamp } from '../../components/stamp';
import { useUrlChoice } from '../../components/use-url-choice';
import { useObjectField } from './use-objects';

const RADII = ['10', '30', '60', '300'] as const;
const RADIUS_WORDS: Record<(typeof RADII)[number], string> = { '10': '10″', '30': '30″', '60': '1′', '300': '5′' };

/** The sky around the object, and the nearest sources that are not part of it. */
export function FieldSection({ group, object }: { group: string; object: ObjectDetail }) {
  const navigate = useNavigate();
  const [radius, setRadius] = useUrlChoice('radius', RADII, '30');
  const field = useObjectField(group, object.number, Number(radius));
  const open = (number: number | null) => {
    if (number !== null && number !== object.number) void navigate(`/g/${group}/objects/${number}`);
  };
  return (
    <Section
      title="Field"
      actions={
        <label className="flex items-center gap-2">
          Radius
          <select
            className="min-h-7 rounded-sm border border-edge bg-raised px-1"
            value={radius}
            onChange={(event) => setRadius(RADII.find((one) => one === event.target.value) ?? '30')}
          >
            {RADII.map((one) => (
              <option key={one} value={one}>
                {RADIUS_WORDS[one]}
              </option>
            ))}
          </select>
        </label>
      }
    >
      {field.isPending && <Loading rows={8} label="Loading the field" />}
      {field.isError && <ProblemNotice problem={field.error} retry={() => void field.refetch()} />}
      {field.data !== undefined && (
        <div className="grid gap-6 wide:grid-cols-[minmax(20rem,1.6fr)_minmax(14rem,1fr)]">
          <FindingChart
            title={`Field of object ${object.number}`}
            centre={{ raDeg: object.raDeg, decDeg: object.decDeg }}
            radiusArcsec={field.data.radiusArcsec}
            sources={field.data.sources.map((source) => ({
              id: source.entryId,
              label: source.designation,
              catalogue: source.catalogue,
              ordinal: source.ordinal,
              raDeg: source.raDeg,
              decDeg: source.decDeg,
              errMajArcsec: source.errMajArcsec,
              errMinArcsec: source.errMinArcsec,
              errPaDeg: source.errPaDeg,
              pmRaMasYr: source.pmRaMasYr,
              pmDecMasYr: source.pmDecMasYr,
              emphasis: source.member ? 'member' : 'neighbour',
            }))}
            onChoose={(chosen) =>
              open(field.data.sources.find((source) => source.entryId === chosen.id)?.objectNumber ?? null)
            }
          />
          <div className="grid content-start gap-2">
            <h3 className="font-medium">Nearest that are not part of it</h3>
            <ul className="grid gap-1">
              {field.data.nearest.map((source) => (
                <li key={source.entryId} className="flex flex-wrap items-center gap-2">
                  <Stamp catalogue={{ label: source.catalogue, ordinal: source.ordinal }} />
                  {source.objectNumber === null ? (
                    source.designation
                  ) : (
                    <Link to={`../objects/${source.objectNumber}`} className="text-link">
                      {source.designation}
                    </Link>
                  )}
                  <span className="text-muted">{formatSepArcsec(source.sepArcsec)}</span>
                </li>
              ))}
            </ul>
            {field.data.nearest.length === 0 && <p className="text-muted">None within a degree.</p>}
          </div>
        </div>
      )}
    </Section>
  );
}
