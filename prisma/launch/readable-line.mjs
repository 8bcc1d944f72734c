/**
 * A line of a child's log as a person reads it: the message, and what went wrong. Other lines stay as they are.
 * @param {string} line one JSON object of pino, or any text
 * @returns {string}
 */
export function makeReadable(line) {
  const entry = parse(line);
  if (typeof entry?.msg !== 'string') return line;
  const cause = typeof entry.err?.message === 'string' ? entry.err.message.split('\n')[0] : '';
  return [entry.msg, cause].filter(Boolean).join(': ');
}

function parse(line) {
  if (!line.startsWith('{')) return null;
  try {
    return JSON.parse(line);
  } catch {
    return null;
  }
}
