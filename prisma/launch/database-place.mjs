/**
 * Host, port and database of a connection string, without user and password.
 * @param {string} url
 * @returns {string}
 */
export function describePlace(url) {
  try {
    const { host, pathname, searchParams } = new URL(url);
    return `${searchParams.get('host') ?? host}${pathname}`;
  } catch {
    return 'DATABASE_URL';
  }
}
