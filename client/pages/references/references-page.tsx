import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { citationList, type CatalogueCitation } from '../../../shared/schemas/catalogue';
import { keys } from '../../api/query-keys';
import { groupPath, request } from '../../api/request';
import { useGroup } from '../../api/use-group';
import { CopyButton } from '../../components/copy-button';
import { EmptyState } from '../../components/empty-state';
import { LinkButton } from '../../components/link-button';
import { Loading } from '../../components/loading';
import { MarginNote } from '../../components/margin';
import { Page } from '../../components/page';
import { ProblemNotice } from '../../components/problem-notice';
import { formatCount } from '../../components/quantities';
import { Stamp } from '../../components/stamp';

/** The citations that work with the group's catalogues owes. */
export function ReferencesPage() {
  const group = useGroup();
  const citations = useQuery({
    queryKey: [...keys.catalogues(group.slug), 'citations'],
    queryFn: ({ signal }) => request({ path: groupPath(group.slug, 'citations'), answer: citationList, signal }),
  });
  const items = citations.data?.items ?? [];
  const all = items.map((item) => `${item.label}: ${item.citation === '' ? '(no citation given)' : item.citation}`);
  return (
    <Page
      title="References"
      lead="What a paper with these catalogues has to cite."
      actions={items.length > 0 && <CopyButton text={all.join('\n')} label="Copy all" />}
      margin={
        <MarginNote title="What stands here">
          The citation that each catalogue was given at import. An object counts for a catalogue when one of its sources
          belongs to it.
        </MarginNote>
      }
    >
      {citations.isPending && <Loading rows={4} label="Loading the citations" />}
      {citations.isError && <ProblemNotice problem={citations.error} retry={() => void citations.refetch()} />}
      {citations.isSuccess && items.length === 0 && (
        <EmptyState
          title="No catalogue, so nothing to cite yet"
          actions={group.can('contributor') && <LinkButton to="../catalogues/new">Add a catalogue</LinkButton>}
        >
          Citations are written down when a catalogue is added.
        </EmptyState>
      )}
      <ul className="grid gap-4">
        {items.map((item) => (
          <Citation key={item.label} item={item} />
        ))}
      </ul>
    </Page>
  );
}

function Citation({ item }: { item: CatalogueCitation }) {
  return (
    <li className="grid gap-1 border-b border-rule pb-4">
      <div className="flex flex-wrap items-center gap-2">
        <Stamp catalogue={item} />
        <Link to={`../catalogues/${item.label}`} className="font-medium text-link">
          {item.label}
        </Link>
        <span className="text-muted">
          {item.title} · {formatCount(item.objects)} objects
        </span>
      </div>
      {item.citation === '' ? (
        <p className="text-warn">No citation has been given for this catalogue.</p>
      ) : (
        <p className="font-serif text-base">{item.citation}</p>
      )}
    </li>
  );
}
