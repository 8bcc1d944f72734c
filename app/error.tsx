'use client';

/** Something broke on the server or in the page. The reason is in the server's log; here is what can be done. */
import { useEffect } from 'react';
import { Button } from './_components/controls/button';
import { Notice } from './_components/text/notice';

interface ErrorPageProps {
  error: unknown;
  retry: () => void;
}

export default function ErrorPage({ error, retry }: ErrorPageProps) {
  useEffect(() => {
    console.error(error);
  }, [error]);
  const digest = error instanceof Error && 'digest' in error ? String(error.digest) : null;
  return (
    <Notice
      explanation={{
        what: 'This page could not be made.',
        why: 'The server met a fault, or did not reach its database.',
        tryThis: 'Try again in a moment. Nothing that was stored is lost.',
      }}
    >
      {digest ? <p>In the log of the server it stands under {digest}.</p> : null}
      <p>
        <Button kind="main" onClick={() => retry()}>
          Try again
        </Button>
      </p>
    </Notice>
  );
}
