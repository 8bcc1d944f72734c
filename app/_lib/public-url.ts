/** The public address of a path of the app, from APP_URL at run time. */
import 'server-only';
import { getSettings } from '@/lib/services/env';

export function publicUrl(path: string): string {
  return new URL(path, getSettings().appUrl).href;
}
