/** While the list is read: the frame of the page, and a sentence. */
import { PageFrame } from '../_components/frame/page-frame';
import { Question } from '../_components/frame/question';

export default function Loading() {
  return (
    <PageFrame viewer={null}>
      <Question id="loading" question="One moment" isFirst>
        <p role="status">Reading the workspace.</p>
      </Question>
    </PageFrame>
  );
}
