'use client';

/** One locale for numbers in controls on the server and in the browser, so that nothing changes when the page wakes. */
import type { ReactNode } from 'react';
import { I18nProvider } from 'react-aria-components/I18nProvider';
import { LOCALE } from '@/app/_lib/locale';

export function Locale({ children }: { children: ReactNode }) {
  return <I18nProvider locale={LOCALE}>{children}</I18nProvider>;
}
