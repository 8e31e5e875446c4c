import type { Metadata } from 'next';
import { PageHeading } from '@/components/shell/page-heading';
import { AddUserForm } from '@/components/users/add-user-form';
import { UserTable } from '@/components/users/user-table';
import { getAdminPageContext } from '@/lib/auth/get-page-context';
import { listUsers } from '@/lib/users/list-users';
import { addUserAction, disableUserAction, enableUserAction, inviteUserAction, setAdminAction } from './actions';

export const metadata: Metadata = { title: 'People' };

export default async function UsersPage() {
  const context = await getAdminPageContext();
  const { items } = await listUsers(context, { q: '' });
  return (
    <>
      <PageHeading title="People" />
      <AddUserForm send={addUserAction} />
      <UserTable users={items} acts={{ invite: inviteUserAction, disable: disableUserAction, enable: enableUserAction, setAdmin: setAdminAction }} />
    </>
  );
}
