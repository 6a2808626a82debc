import type { DeskTask } from '../../../shared/schemas/run';
import type { ChartSource } from '../../charts/finding-chart';

/** The chart at first shows the run's radius around A and as much again beside it. */
const CHART_RADII = 2;

/** Radius (arcsec) of the chart at first: the field that was loaded reaches further and comes in by zooming out. */
export function chartRadiusArcsec(fieldRadiusArcsec: number, runRadiusArcsec: number): number {
  return Math.min(fieldRadiusArcsec, CHART_RADII * runRadiusArcsec);
}

type FieldSource = DeskTask['field'][number] | DeskTask['candidate']['a'];

/** The sources of a task as the finding chart draws them: the pair, other candidates of either side, the rest. */
export function chartSources({
  candidate,
  others,
  field,
}: Pick<DeskTask, 'candidate' | 'others' | 'field'>): ChartSource[] {
  const { a, b } = candidate;
  const inPlay = new Set(others.flatMap((other) => [other.a.entryId, other.b.entryId]));
  const emphasisOf = (entryId: number): ChartSource['emphasis'] => {
    if (entryId === a.entryId) return 'a';
    if (entryId === b.entryId) return 'b';
    return inPlay.has(entryId) ? 'member' : 'neighbour';
  };
  const drawn = field.map((source) => chartSource(source, emphasisOf(source.entryId)));
  // A crowded field is cut off at its nearest sources; the pair in question is drawn in any case.
  const missing = [a, b].filter(({ entryId }) => !field.some((source) => source.entryId === entryId));
  return [...missing.map((source) => chartSource(source, emphasisOf(source.entryId))), ...drawn];
}

function chartSource(source: FieldSource, emphasis: ChartSource['emphasis']): ChartSource {
  const { entryId, designation, catalogue, ordinal, raDeg, decDeg, errMajArcsec, errMinArcsec, errPaDeg } =
    source;
  return {
    id: entryId,
    label: designation,
    catalogue,
    ordinal,
    raDeg,
    decDeg,
    errMajArcsec,
    errMinArcsec,
    errPaDeg,
    pmRaMasYr: 'pmRaMasYr' in source ? source.pmRaMasYr : null,
    pmDecMasYr: 'pmDecMasYr' in source ? source.pmDecMasYr : null,
    emphasis,
  };
}

/** The candidate to open when a source of the chart is chosen: the closest other candidate it takes part in. */
export function seqOfSource(others: DeskTask['others'], entryId: number | string): number | null {
  return others.find(({ a, b }) => a.entryId === entryId || b.entryId === entryId)?.seq ?? null;
}
