/** Above the brief of a market that was archived: it can be read, and put back on the list. */
import { Question } from '../frame/question';
import { RestoreButton } from './restore-button';

interface ArchivedNoteProps {
  market: { id: string; name: string; archivedAt: Date | null };
  canWrite: boolean;
}

export function ArchivedNote({ market, canWrite }: ArchivedNoteProps) {
  if (!market.archivedAt) return null;
  return (
    <Question id="archived" question="Is it still followed?" isScreenOnly>
      <p>This market is archived: it is off the list, and everything in it is kept.</p>
      {canWrite ? (
        <div>
          <RestoreButton marketId={market.id} name={market.name} />
        </div>
      ) : null}
    </Question>
  );
}
