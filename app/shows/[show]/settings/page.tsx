import type { Metadata } from 'next';
import { PageHeading } from '@/components/shell/page-heading';
import { AddMemberForm } from '@/components/shows/add-member-form';
import { ArchiveShow } from '@/components/shows/archive-show';
import { MemberTable } from '@/components/shows/member-table';
import { ShowSettingsForm } from '@/components/shows/show-settings-form';
import { listImportedNames } from '@/lib/imports/list-imported-names';
import { may } from '@/lib/rules/roles';
import { getPageShow } from '@/lib/shows/get-page-show';
import { listMembers } from '@/lib/shows/list-members';
import { showAnswer } from '@/lib/shows/show-answer';
import { editShowAction, removeMemberAction, setMemberAction } from './actions';

export const metadata: Metadata = { title: 'Settings' };

export default async function SettingsPage({ params }: { params: Promise<{ show: string }> }) {
  const { context, access } = await getPageShow((await params).show, 'readShow');
  const show = showAnswer(access.show);
  const members = await listMembers(context, { show: show.code });
  const importedNames = await listImportedNames(context, { show: show.code });
  const mayEdit = may(access.role, 'editShow');
  const mayEditMembers = may(access.role, 'editMembers') && !show.archived;
  return (
    <>
      <PageHeading title="Settings" />
      <div className="grid gap-x-14 gap-y-10 px-4 py-6 md:px-6 xl:grid-cols-[minmax(0,40rem)_minmax(0,1fr)]">
        <div className="flex min-w-0 flex-col gap-8">
          {mayEdit ? null : <p className="text-14 text-ink-2">A lead changes these.</p>}
          <ShowSettingsForm show={show} mayEdit={mayEdit} importedNames={importedNames} send={editShowAction} />
          {mayEdit ? <ArchiveShow show={show} send={editShowAction} /> : null}
        </div>
        <section aria-labelledby="people-heading" className="flex min-w-0 flex-col gap-5">
          <h2 id="people-heading">People</h2>
          {mayEditMembers ? <AddMemberForm show={show.code} send={setMemberAction} /> : null}
          <MemberTable show={show.code} members={members} mayEdit={mayEditMembers} setMember={setMemberAction} removeMember={removeMemberAction} />
        </section>
      </div>
    </>
  );
}
