/** The cookies that better-auth asks to set, as plain values that a page's server action can set. */
import { parseSetCookieHeader, toCookieOptions } from 'better-auth/cookies';

export interface SessionCookie {
  name: string;
  value: string;
  options: {
    maxAge?: number;
    expires?: Date;
    path?: string;
    secure?: boolean;
    httpOnly?: boolean;
    sameSite?: 'lax' | 'strict' | 'none';
  };
}

export function readSessionCookies(headers: Headers): SessionCookie[] {
  return headers.getSetCookie().flatMap((line) =>
    [...parseSetCookieHeader(line)].map(([name, attributes]) => {
      const { maxAge, expires, path, secure, httpOnly, sameSite } = toCookieOptions(attributes);
      return {
        name,
        value: attributes.value,
        options: { maxAge, expires, path, secure, httpOnly, sameSite },
      };
    }),
  );
}
