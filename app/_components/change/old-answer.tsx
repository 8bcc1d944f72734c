/** Stands over an answer whose question has changed since. */
import styles from './change.module.css';

export function OldAnswer() {
  return <p className={styles.note}>Found before the last change; look again for what is set now.</p>;
}
