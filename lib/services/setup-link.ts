/** What owner and member links have in common: where they lead and how long they open. */
const SETUP_LINK_HOURS = 72;

export function setupLinkPath(token: string): string {
  return `/setup/${token}`;
}

export function setupLinkExpiry(now: Date): Date {
  return new Date(now.getTime() + SETUP_LINK_HOURS * 60 * 60 * 1000);
}
