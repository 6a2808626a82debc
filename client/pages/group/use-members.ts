import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { groupDetail, member, memberList, type NewMember } from '../../../shared/schemas/group';
import type { Role } from '../../../shared/words';
import { keys } from '../../api/query-keys';
import { groupPath, request } from '../../api/request';

export function useGroupDetail(group: string) {
  return useQuery({
    queryKey: keys.groupDetail(group),
    queryFn: ({ signal }) => request({ path: groupPath(group), answer: groupDetail, signal }),
  });
}

export function useMembers(group: string) {
  return useQuery({
    queryKey: keys.members(group),
    queryFn: ({ signal }) => request({ path: groupPath(group, 'members'), answer: memberList, signal }),
  });
}

/** Adding, changing and removing members; each refreshes the list. */
export function useMemberChanges(group: string) {
  const client = useQueryClient();
  const onSuccess = () => client.invalidateQueries({ queryKey: keys.members(group) });
  return {
    add: useMutation({
      mutationFn: (body: NewMember) =>
        request({ method: 'POST', path: groupPath(group, 'members'), body, answer: member }),
      onSuccess,
    }),
    change: useMutation({
      mutationFn: ({ personId, role }: { personId: number; role: Role }) =>
        request({ method: 'PATCH', path: groupPath(group, 'members', personId), body: { role } }),
      onSuccess,
    }),
    remove: useMutation({
      mutationFn: (personId: number) => request({ method: 'DELETE', path: groupPath(group, 'members', personId) }),
      onSuccess,
    }),
  };
}
