import { keepPreviousData, useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { catalogueList } from '../../../shared/schemas/catalogue';
import { findAnswer } from '../../../shared/schemas/find';
import { note, objectAnswer, objectField, registryChange } from '../../../shared/schemas/object';
import { keys } from '../../api/query-keys';
import { groupPath, request } from '../../api/request';

export function useObject(group: string, number: number) {
  return useQuery({
    queryKey: keys.object(group, number),
    queryFn: ({ signal }) => request({ path: groupPath(group, 'objects', number), answer: objectAnswer, signal }),
  });
}

export function useObjectField(group: string, number: number, radiusArcsec: number) {
  return useQuery({
    queryKey: [...keys.object(group, number), 'field', radiusArcsec],
    placeholderData: keepPreviousData,
    queryFn: ({ signal }) =>
      request({ path: groupPath(group, 'objects', number, 'field'), query: { radiusArcsec }, answer: objectField, signal }),
  });
}

/** Order of arrival of the catalogues by label: what their stamps are drawn from. */
export function useStamps(group: string): ReadonlyMap<string, number> {
  const list = useQuery({
    queryKey: keys.catalogues(group),
    queryFn: ({ signal }) => request({ path: groupPath(group, 'catalogues'), answer: catalogueList, signal }),
  });
  return new Map(list.data?.items.map((item) => [item.label, item.ordinal]));
}

export function useFind(group: string, q: string, radiusArcsec: number) {
  return useQuery({
    queryKey: [...keys.find(group, q), radiusArcsec],
    enabled: q !== '',
    queryFn: ({ signal }) =>
      request({ path: groupPath(group, 'find'), query: { q, radiusArcsec, limit: 50 }, answer: findAnswer, signal }),
  });
}

/** Changes of one object; each refreshes everything of the group's objects. */
export function useObjectChanges(group: string, number: number) {
  const client = useQueryClient();
  const onSettled = () => client.invalidateQueries({ queryKey: keys.objects(group) });
  const change = <T>(mutationFn: (input: T) => Promise<unknown>) => ({ mutationFn, onSettled });
  return {
    rename: useMutation(
      change(({ name, version }: { name: string; version: number }) =>
        request({ method: 'PATCH', path: groupPath(group, 'objects', number), body: { name }, ifMatch: version }),
      ),
    ),
    addName: useMutation(
      change((name: string) =>
        request({ method: 'POST', path: groupPath(group, 'objects', number, 'aliases'), body: { name } }),
      ),
    ),
    retireName: useMutation(
      change((aliasId: number) => request({ method: 'POST', path: groupPath(group, 'aliases', aliasId, 'retire') })),
    ),
    addNote: useMutation(
      change((body: string) =>
        request({ method: 'POST', path: groupPath(group, 'objects', number, 'notes'), body: { body }, answer: note }),
      ),
    ),
    editNote: useMutation(
      change(({ noteId, body }: { noteId: number; body: string }) =>
        request({ method: 'PATCH', path: groupPath(group, 'notes', noteId), body: { body } }),
      ),
    ),
    deleteNote: useMutation(
      change((noteId: number) => request({ method: 'DELETE', path: groupPath(group, 'notes', noteId) })),
    ),
    split: useMutation(
      change((input: { entryIds: number[]; remark: string }) =>
        request({
          method: 'POST',
          path: groupPath(group, 'objects', 'split'),
          body: { number, ...input },
          answer: registryChange,
        }),
      ),
    ),
  };
}

/** Merging objects by hand. */
export function useMerge(group: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: { numbers: number[]; remark: string }) =>
      request({ method: 'POST', path: groupPath(group, 'objects', 'merge'), body, answer: registryChange }),
    onSettled: () => client.invalidateQueries({ queryKey: keys.objects(group) }),
  });
}
