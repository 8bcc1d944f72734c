'use client';

/** Numbers in the controls below are written and read in the locale of the page, whatever the browser's own is. */
import type { ReactNode } from 'react';
import { I18nProvider } from 'react-aria-components/I18nProvider';
import { LOCALE } from '@/app/_lib/locale';

export function NumberLocale({ children }: { children: ReactNode }) {
  return <I18nProvider locale={LOCALE}>{children}</I18nProvider>;
}
