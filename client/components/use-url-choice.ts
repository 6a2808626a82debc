import { useSearchParams } from 'react-router-dom';

/** One of a closed list of choices, kept in the URL under `name`; the fallback leaves no trace there. */
export function useUrlChoice<Id extends string>(
  name: string,
  ids: readonly Id[],
  fallback: Id,
): [Id, (id: Id) => void] {
  const [search, setSearch] = useSearchParams();
  const given = search.get(name);
  const current = ids.find((id) => id === given) ?? fallback;
  const choose = (id: Id) => {
    setSearch(
      (before) => {
        const after = new URLSearchParams(before);
        if (id === fallback) after.delete(name);
        else after.set(name, id);
        return after;
      },
      { replace: true },
    );
  };
  return [current, choose];
}
