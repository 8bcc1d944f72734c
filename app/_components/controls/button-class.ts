/** Looks of a button, for buttons and for links that are the next step. */
import styles from './button.module.css';

export type ButtonKind = 'main' | 'plain' | 'text';

export function buttonClass(kind: ButtonKind): string {
  return `${styles.button} ${styles[kind]}`;
}
