/** Who is asking, read once for each request. Pages of the workspace send a visitor without a session to sign in. */
import 'server-only';
import { headers } from 'next/headers';
import { redirect } from 'next/navigation';
import { cache } from 'react';
import { findViewer } from '@/lib/services/find-viewer';
import type { Viewer } from '@/lib/services/viewer';

export const readViewer = cache(async (): Promise<Viewer | null> => findViewer(await headers()));

/** @param returnTo path of the page asked for, opened after signing in. */
export async function requireViewer(returnTo = '/'): Promise<Viewer> {
  const viewer = await readViewer();
  if (!viewer) redirect(returnTo === '/' ? '/sign-in' : `/sign-in?next=${encodeURIComponent(returnTo)}`);
  return viewer;
}
