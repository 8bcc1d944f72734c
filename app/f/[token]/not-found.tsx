/** What a wrong, an expired and a withdrawn forecast link show alike. */
import { Notice } from '@/app/_components/text/notice';
import { explainCode } from '@/lib/services/explain';

export default function LinkNotAvailable() {
  return <Notice explanation={explainCode('not-available')} />;
}
