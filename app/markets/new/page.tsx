/** A new market: upload or paste, check what was understood, store. */
import type { Metadata } from 'next';
import { PageFrame } from '@/app/_components/frame/page-frame';
import { NewMarketFlow } from '@/app/_components/import/new-market-flow';
import { Opening } from '@/app/_components/text/opening';
import { requireViewer } from '@/app/_lib/require-viewer';
import { explainCode } from '@/lib/services/explain';
import { canWrite } from '@/lib/services/viewer';

export const metadata: Metadata = { title: 'New market' };

export default async function NewMarketPage() {
  const viewer = await requireViewer('/markets/new');
  const refusal = canWrite(viewer) ? null : explainCode('not-allowed');
  return (
    <PageFrame title="New market" viewer={viewer}>
      <Opening headline={refusal ? refusal.what : 'Bring two firms’ monthly users.'}>
        <p>
          {refusal
            ? `${refusal.why} ${refusal.tryThis}`
            : 'A few minutes later you read where the market is heading and how sure that is.'}
        </p>
      </Opening>
      {refusal ? null : <NewMarketFlow />}
    </PageFrame>
  );
}
