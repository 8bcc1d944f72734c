/** Where a revision comes from: who stored it and when, the file and its hash, the notes, how it was read. */
import type { ReactNode } from 'react';
import { formatDay } from '@/app/_lib/locale';
import type { Revision } from '@/lib/services/read-revision';
import styles from './revision-source.module.css';

export function RevisionSource({ revision }: { revision: Revision }) {
  const { createdAt, createdByName, fileName, fileHash, note, sourceNote, readingNotes, restoredFrom } =
    revision;
  return (
    <dl className={styles.source}>
      <Fact term="Stored">
        {formatDay(createdAt)}
        {createdByName ? ` by ${createdByName}` : ''}
      </Fact>
      {restoredFrom === null ? null : <Fact term="Brought back from">revision {restoredFrom}</Fact>}
      {fileName ? <Fact term="File">{fileName}</Fact> : null}
      {fileHash ? (
        <Fact term="SHA-256 of the file">
          <code className={styles.hash}>{fileHash}</code>
        </Fact>
      ) : null}
      {note ? <Fact term="Why">{note}</Fact> : null}
      {sourceNote ? <Fact term="Where the rival’s figures come from">{sourceNote}</Fact> : null}
      {readingNotes.length > 0 ? (
        <Fact term="How it was read">
          <ul className={styles.notes}>
            {readingNotes.map((text) => (
              <li key={text}>{text}</li>
            ))}
          </ul>
        </Fact>
      ) : null}
    </dl>
  );
}

function Fact({ term, children }: { term: string; children: ReactNode }) {
  return (
    <div>
      <dt>{term}</dt>
      <dd>{children}</dd>
    </div>
  );
}
