/** Who should see it? Issue the forecast, list what was issued, make and withdraw links. */
import type { MarketPage } from '@/lib/services/read-market';
import type { KeptScenario } from '../change/kept-scenarios';
import { Question } from '../frame/question';
import { IssueForm } from './issue-form';
import { IssuedList } from './issued-list';

interface IssueSectionProps {
  page: MarketPage;
  scenarios: KeptScenario[];
  canWrite: boolean;
}

export function IssueSection({ page, scenarios, canWrite }: IssueSectionProps) {
  const canIssue = canWrite && page.outlook !== null && page.outlook.staleReasons.length === 0;
  return (
    <Question id="issue" question="Who should see it?" note={<IssueNote />} isScreenOnly>
      {canIssue ? <IssueForm marketId={page.market.id} scenarios={scenarios} /> : null}
      {canWrite && !canIssue && page.outlook ? (
        <p>Only an outlook that is up to date can be issued: fit again first.</p>
      ) : null}
      <IssuedList
        marketId={page.market.id}
        issued={page.issued}
        newestRevision={page.revision.number}
        canWrite={canWrite}
      />
    </Question>
  );
}

function IssueNote() {
  return (
    <>
      <p>
        Issuing freezes the numbers with your name and today’s date. Later data or edits do not change them.
        The events on its chart go with it.
      </p>
      <p>A link shows an issued forecast to whoever has it, until it expires or is withdrawn.</p>
    </>
  );
}
