'use client';

/** A link that is shown once, with a button that copies it. */
import { useId, useState } from 'react';
import { Button } from './button';
import styles from './secret-link.module.css';

interface SecretLinkProps {
  label: string;
  url: string;
  note: string;
}

type CopyState = 'not-copied' | 'copied' | 'failed';

const SAID: Record<CopyState, string> = {
  'not-copied': '',
  copied: 'Copied.',
  failed: 'The browser did not allow copying. Select the link and copy it.',
};

export function SecretLink({ label, url, note }: SecretLinkProps) {
  const id = useId();
  const [copy, setCopy] = useState<CopyState>('not-copied');

  async function copyUrl() {
    try {
      await navigator.clipboard.writeText(url);
      setCopy('copied');
    } catch {
      setCopy('failed');
    }
  }

  return (
    <div className={styles.block}>
      <label htmlFor={id} className={styles.label}>
        {label}
      </label>
      <div className={styles.line}>
        <input
          id={id}
          className={styles.url}
          readOnly
          value={url}
          aria-describedby={`${id}-note`}
          onFocus={(event) => event.target.select()}
        />
        <Button kind="main" onClick={copyUrl}>
          Copy
        </Button>
      </div>
      <p id={`${id}-note`} className={styles.note}>
        {note} <span role="status">{SAID[copy]}</span>
      </p>
    </div>
  );
}
