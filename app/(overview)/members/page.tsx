/** Who is in the workspace; owners invite analysts and readers with a one-time set-up link. */
import type { Metadata } from 'next';
import { InviteForm } from '@/app/_components/account/invite-form';
import { MemberTable } from '@/app/_components/account/member-table';
import { PageFrame } from '@/app/_components/frame/page-frame';
import { Question } from '@/app/_components/frame/question';
import { Headline } from '@/app/_components/text/headline';
import { requireViewer } from '@/app/_lib/require-viewer';
import { listMembers } from '@/lib/services/list-members';
import { canInvite } from '@/lib/services/viewer';

export const metadata: Metadata = { title: 'Members' };

export default async function MembersPage() {
  const viewer = await requireViewer('/members');
  const members = await listMembers(viewer);
  const count = members.length === 1 ? 'One member.' : `${members.length} members.`;
  return (
    <PageFrame title={viewer.workspaceName} viewer={viewer}>
      <Question id="members" question="Who works here?" note={<RoleNote />} isFirst>
        <Headline>{count}</Headline>
        <MemberTable members={members} />
      </Question>
      {canInvite(viewer) ? (
        <Question
          id="invite"
          question="Who should join?"
          note={<p>The link makes one account and opens for three days.</p>}
        >
          <InviteForm />
        </Question>
      ) : null}
    </PageFrame>
  );
}

function RoleNote() {
  return (
    <>
      <p>Owners do everything and invite.</p>
      <p>Analysts import, fit and issue.</p>
      <p>Readers look.</p>
    </>
  );
}
