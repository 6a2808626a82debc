import { useSearchParams } from 'react-router-dom';
import { useGroup } from '../../api/use-group';
import { EmptyState } from '../../components/empty-state';
import { LinkButton } from '../../components/link-button';
import { Loading } from '../../components/loading';
import { MarginNote } from '../../components/margin';
import { Page } from '../../components/page';
import { ProblemNotice } from '../../components/problem-notice';
import { NewRunForm } from './new-run-form';
import { settingsOfSearch } from './new-run-settings';
import { useReadyCatalogues } from './use-ready-catalogues';

/** Settings of a new cross-match; the address may bring those of an earlier one. */
export function NewRunPage() {
  const group = useGroup();
  const [search] = useSearchParams();
  const ready = useReadyCatalogues(group.slug);
  return (
    <Page
      title="New cross-match"
      lead="Which catalogues, and how close two sources must be to be asked about."
      margin={<Cautions />}
    >
      {!group.can('curator') && (
        <EmptyState
          title="A curator starts cross-matches"
          actions={<LinkButton to="../cross-match">To the cross-matches</LinkButton>}
        >
          You are a {group.role} of this group. You can look at every cross-match; ask a curator or an owner
          to start one.
        </EmptyState>
      )}
      {group.can('curator') && (
        <>
          {ready.isPending && <Loading rows={5} label="Loading the catalogues" />}
          {ready.isError && <ProblemNotice problem={ready.error} retry={() => void ready.refetch()} />}
          {ready.data !== undefined && ready.data.length < 2 && (
            <EmptyState
              title="Two catalogues are needed"
              actions={
                <LinkButton kind="main" to="../catalogues/new">
                  Add a catalogue
                </LinkButton>
              }
            >
              A cross-match compares catalogues that have been imported.{' '}
              {ready.data.length === 0
                ? 'None is ready yet.'
                : `Only ${ready.data[0]?.label ?? 'one'} is ready.`}
            </EmptyState>
          )}
          {ready.data !== undefined && ready.data.length >= 2 && (
            <NewRunForm
              group={group.slug}
              ready={ready.data}
              initial={settingsOfSearch(
                search,
                ready.data.map(({ label }) => label),
              )}
            />
          )}
        </>
      )}
    </Page>
  );
}

function Cautions() {
  return (
    <>
      <MarginNote title="The radius is a limit, not a verdict">
        It only says which pairs are listed. Take it generously, several times the errors: what lies inside is
        measured and judged afterwards, what lies outside is never seen.
      </MarginNote>
      <MarginNote title="A beam is not an error">
        The resolution of an instrument tells how blurred a source is, its positional error how well its
        middle is known. For a bright source the error is a small part of the beam. The radius should follow
        the errors.
      </MarginNote>
      <MarginNote title="Close is evidence, not proof">
        In a crowded field, chance alone puts sources next to each other. Each cross-match measures how many
        such pairs there are by shifting the first catalogue and comparing again.
      </MarginNote>
      <MarginNote title="Motions are not applied">
        Positions are compared as they stand, each at its own epoch. A star that moves 0.2″ a year is 3.2″
        away after 16 years. Where epochs differ, fast sources fall outside a small radius.
      </MarginNote>
      <MarginNote title="A and B">
        The first catalogue is A. Ranks and position angles are given from A to B; chance pairs are measured
        by shifting A. The candidates are the same in either order.
      </MarginNote>
    </>
  );
}
