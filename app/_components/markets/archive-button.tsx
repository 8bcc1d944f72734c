'use client';

/** Takes a market off the list; it can be restored, so nothing is asked first. */
import { archiveMarketAction } from '@/app/_actions/archive-market';
import { MoveButton } from './move-button';

export function ArchiveButton({ marketId, name }: { marketId: string; name: string }) {
  return (
    <MoveButton label={`Archive ${name}`} busyLabel="Archiving" move={() => archiveMarketAction(marketId)}>
      Archive
    </MoveButton>
  );
}
