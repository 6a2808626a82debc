import { useParams } from 'react-router-dom';
import { roleAtLeast, type Role } from '../../shared/words';
import { noSuchGroup } from './problem-error';
import { useSession } from './session';

export interface CurrentGroup {
  slug: string;
  name: string;
  role: Role;
  /** True when the person's role in this group allows what `needed` allows. */
  can: (needed: Role) => boolean;
}

/** The group of the address. Only for pages below /g/:group, whose guard has checked the membership. */
export function useGroup(): CurrentGroup {
  const slug = useParams().group ?? '';
  const membership = useSession().memberships.find((one) => one.group === slug);
  if (membership === undefined) throw noSuchGroup(slug);
  const { name, role } = membership;
  return { slug, name, role, can: (needed) => roleAtLeast(role, needed) };
}
