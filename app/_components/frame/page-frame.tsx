/**
 * The frame of a page: skip link, masthead with one rule, main, foot. The masthead says whose page this is on the left
 * and the facts of the document on the right; the foot carries the account and the standing caution.
 */
import Link from 'next/link';
import type { ReactNode } from 'react';
import styles from './page-frame.module.css';
import { SignOutButton } from './sign-out-button';

export interface PageViewer {
  userName: string;
  workspaceName: string;
}

interface PageFrameProps {
  /** Name of the document after the product's name, e.g. the market. */
  title?: ReactNode;
  /** Short facts at the right: revision, months, issue. */
  facts?: ReactNode;
  /** Who is signed in; null on pages that work signed out. */
  viewer: PageViewer | null;
  children: ReactNode;
}

export function PageFrame({ title, facts, viewer, children }: PageFrameProps) {
  return (
    <div className={styles.page}>
      <a className={styles.skip} href="#main">
        Skip to the content
      </a>
      <header className={styles.masthead}>
        <p className={styles.name}>
          {viewer ? (
            <Link href="/" className={styles.product}>
              Elbowroom
            </Link>
          ) : (
            <span className={styles.product}>Elbowroom</span>
          )}
          {title ? <span className={styles.title}>{title}</span> : null}
        </p>
        {facts ? <p className={styles.facts}>{facts}</p> : null}
      </header>
      <main id="main" tabIndex={-1}>
        {children}
      </main>
      <footer className={styles.foot}>
        <p>Forecasts are estimates from the numbers given, not investment advice.</p>
        {viewer ? <AccountNavigation viewer={viewer} /> : null}
      </footer>
    </div>
  );
}

function AccountNavigation({ viewer }: { viewer: PageViewer }) {
  return (
    <nav aria-label="Account" className={styles.account} data-screen-only>
      <span>
        {viewer.userName}, {viewer.workspaceName}
      </span>
      <Link href="/">Markets</Link>
      <Link href="/members">Members</Link>
      <SignOutButton />
    </nav>
  );
}
