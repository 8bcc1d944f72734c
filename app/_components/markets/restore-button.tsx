'use client';

/** Puts an archived market back on the list. */
import { restoreMarketAction } from '@/app/_actions/restore-market';
import { MoveButton } from './move-button';

export function RestoreButton({ marketId, name }: { marketId: string; name: string }) {
  return (
    <MoveButton label={`Restore ${name}`} busyLabel="Restoring" move={() => restoreMarketAction(marketId)}>
      Restore
    </MoveButton>
  );
}
