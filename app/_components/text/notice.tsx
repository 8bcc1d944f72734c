/** A page that says what happened, why, and what to try, in place of the page that was asked for. */
import type { ReactNode } from 'react';
import { PageFrame, type PageViewer } from '../frame/page-frame';
import { Question } from '../frame/question';
import { Headline } from './headline';

interface NoticeProps {
  question?: string;
  explanation: { what: string; why: string; tryThis: string };
  viewer?: PageViewer | null;
  children?: ReactNode;
}

export function Notice({ question = 'What happened?', explanation, viewer = null, children }: NoticeProps) {
  return (
    <PageFrame viewer={viewer}>
      <Question id="what" question={question} isFirst>
        <Headline
          support={
            <>
              <p>
                {explanation.why} {explanation.tryThis}
              </p>
              {children}
            </>
          }
        >
          {explanation.what}
        </Headline>
      </Question>
    </PageFrame>
  );
}
