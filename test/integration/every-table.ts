/** One row in every table that is there, written in SQL so that it needs no generated client of the newest schema. */

type Query = (sql: string, values?: unknown[]) => Promise<Record<string, unknown>[]>;

const DRAWS = Buffer.from(Float64Array.of(0.1, Math.PI).buffer);

const ROWS: [table: string, row: Record<string, unknown>][] = [
  ['user', { id: 'u', name: 'Ada', email: 'ada@example.org', updatedAt: '2026-01-01' }],
  ['session', { id: 's', token: 't', expiresAt: '2027-01-01', userId: 'u', updatedAt: '2026-01-01' }],
  ['account', { id: 'a', accountId: 'u', providerId: 'credential', userId: 'u', updatedAt: '2026-01-01' }],
  [
    'verification',
    { id: 'v', identifier: 'i', value: 'x', expiresAt: '2027-01-01', updatedAt: '2026-01-01' },
  ],
  ['rate_limit', { key: 'sign-in', points: 3, expire: '2027-01-01' }],
  ['workspace', { id: 'w', name: 'Nordhaven' }],
  ['member', { id: 'm', workspaceId: 'w', userId: 'u', role: 'owner' }],
  ['setup_link', { id: 'l', workspaceId: 'w', tokenHash: 'h', role: 'analyst', expiresAt: '2027-01-01' }],
  [
    'market',
    {
      id: 'k',
      workspaceId: 'w',
      name: 'Ferries',
      unit: 'riders',
      focalName: 'A',
      rivalName: 'B',
      updatedAt: '2026-01-01',
    },
  ],
  ['series_revision', { id: 'r', marketId: 'k', workspaceId: 'w', number: 1, contentHash: 'c' }],
  ['observation', { revisionId: 'r', month: 24300, focal: 12.5, rival: null }],
  ['event', { id: 'e', marketId: 'k', workspaceId: 'w', month: 24300, note: 'price change' }],
  [
    'fit',
    {
      id: 'f',
      workspaceId: 'w',
      marketId: 'k',
      revisionId: 'r',
      state: 'done',
      options: '{"seed":1}',
      seed: 1,
      engineVersion: '1',
      draws: DRAWS,
      drawColumns: ['r1'],
    },
  ],
  [
    'scenario',
    { id: 'c', workspaceId: 'w', marketId: 'k', name: 'spring', pushes: '[]', updatedAt: '2026-01-01' },
  ],
  [
    'issued_forecast',
    {
      id: 'i',
      workspaceId: 'w',
      marketId: 'k',
      fitId: 'f',
      formatVersion: 1,
      content: '{"formatVersion":1}',
      issuedByName: 'Ada',
    },
  ],
  ['forecast_link', { id: 'fl', workspaceId: 'w', issuedForecastId: 'i', tokenHash: 'fh', hint: 'abc' }],
  [
    'analysis',
    {
      id: 'n',
      workspaceId: 'w',
      marketId: 'k',
      revisionId: 'r',
      fitId: 'f',
      kind: 'backtest',
      engineVersion: '1',
      state: 'failed',
      failureCode: 'too-few-origins',
    },
  ],
  [
    'audit_entry',
    { id: 'ae', workspaceId: 'w', action: 'issue-forecast', subjectType: 'issued', subjectId: 'i' },
  ],
];

/** Fills the tables that there are: a database at an earlier migration lacks the later ones. */
export async function fillDatabase(query: Query): Promise<void> {
  for (const [table, row] of ROWS) {
    const [found] = await query('SELECT to_regclass($1) IS NOT NULL AS "isThere"', [`"${table}"`]);
    if (!found?.isThere) continue;
    const names = Object.keys(row).map((name) => `"${name}"`);
    const places = names.map((_, i) => `$${i + 1}`);
    await query(
      `INSERT INTO "${table}" (${names.join(', ')}) VALUES (${places.join(', ')})`,
      Object.values(row),
    );
  }
}

/** All rows of all tables of the app, by table. */
export async function readEverything(query: Query): Promise<Record<string, Record<string, unknown>[]>> {
  const tables = await query(
    `SELECT tablename FROM pg_tables WHERE schemaname = 'public' AND tablename <> '_prisma_migrations' ORDER BY tablename`,
  );
  const entries: [string, Record<string, unknown>[]][] = [];
  for (const { tablename } of tables) {
    entries.push([String(tablename), await query(`SELECT * FROM "${tablename}"`)]);
  }
  return Object.fromEntries(entries);
}
