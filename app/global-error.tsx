'use client';

/** The last resort, when the document itself could not be made: no style sheet may be there. */
export default function GlobalError({ retry }: { error: unknown; retry: () => void }) {
  return (
    <html lang="en-GB">
      <body>
        <main>
          <h1>Elbowroom could not start this page.</h1>
          <p>The server met a fault. Nothing that was stored is lost. Try again in a moment.</p>
          <button type="button" onClick={() => retry()}>
            Try again
          </button>
        </main>
      </body>
    </html>
  );
}
