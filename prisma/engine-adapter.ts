/**
 * The driver adapter as the schema engine needs it, which differs from the library's in two ways:
 *
 * - The engine's look at the catalogue selects three columns of PostgreSQL's one-byte type "char", which the library does
 *   not know and refuses. They are read as text and handed over as the single characters that the engine expects.
 * - The library cuts a script at every semicolon and sends the pieces over several connections. A migration goes to the
 *   server whole, as Prisma's command line sends it: PostgreSQL then applies all of it or nothing.
 *
 * The versions of both are pinned; the tests of the migrations cover this file.
 */
import { PrismaPg } from '@prisma/adapter-pg';
import {
  ColumnTypeEnum,
  DriverAdapterError,
  type SqlDriverAdapter,
  type SqlMigrationAwareDriverAdapterFactory,
} from '@prisma/driver-adapter-utils';
import { DatabaseError } from 'pg';

type PgAdapter = Awaited<ReturnType<PrismaPg['connect']>>;

/** The columns as the engine selects them, and the names they come under. */
const CHAR_COLUMNS = [
  { selected: 'constr.contype AS', name: 'constraint_type' },
  { selected: 'con.confdeltype', name: 'confdeltype' },
  { selected: 'con.confupdtype', name: 'confupdtype' },
];

/** The engine's lock against a second migration at the same time belongs to one connection, which must stay. */
const ONE_CONNECTION = { max: 1, idleTimeoutMillis: 0 };

/** Where the engine finds the database itself and, each time it asks, a fresh empty one: connection strings. */
export interface EngineDatabases {
  database: () => Promise<string>;
  emptyDatabase: () => Promise<string>;
}

export interface EngineAdapter {
  factory: SqlMigrationAwareDriverAdapterFactory;
  /** Ends every connection that the engine opened. */
  close: () => Promise<void>;
}

export function createEngineAdapter(databases: EngineDatabases): EngineAdapter {
  const opened: PgAdapter[] = [];
  async function connect(url: string): Promise<SqlDriverAdapter> {
    const adapter = await new PrismaPg({ connectionString: url, ...ONE_CONNECTION }).connect();
    opened.push(adapter);
    sendScriptsWhole(adapter);
    readCharColumns(adapter);
    return adapter;
  }
  return {
    factory: {
      provider: 'postgres',
      adapterName: '@prisma/adapter-pg',
      connect: async () => connect(await databases.database()),
      connectToShadowDb: async () => connect(await databases.emptyDatabase()),
    },
    close: async () => {
      const pools = opened.map((adapter) => adapter.underlyingDriver());
      await Promise.all(pools.filter((pool) => !pool.ending).map((pool) => pool.end()));
    },
  };
}

function sendScriptsWhole(adapter: PgAdapter): void {
  adapter.executeScript = async (script) => {
    try {
      await adapter.underlyingDriver().query(script);
    } catch (error) {
      throw error instanceof DatabaseError ? toAdapterError(error) : error;
    }
  };
}

/** The form in which the engine takes down what the database said. */
function toAdapterError({ code = '', severity = 'ERROR', message, detail, column, hint }: DatabaseError) {
  return new DriverAdapterError({ kind: 'postgres', code, severity, message, detail, column, hint });
}

function readCharColumns(adapter: SqlDriverAdapter): void {
  const queryRaw = adapter.queryRaw.bind(adapter);
  adapter.queryRaw = async (query) => {
    const present = CHAR_COLUMNS.filter(({ selected }) => query.sql.includes(selected));
    const sql = present.reduce(
      (text, { selected }) => text.replace(selected, castToText(selected)),
      query.sql,
    );
    const result = await queryRaw({ ...query, sql });
    for (const { name } of present) {
      result.columnTypes[result.columnNames.indexOf(name)] = ColumnTypeEnum.Character;
    }
    return result;
  };
}

function castToText(selected: string): string {
  return selected.replace(/^\S+/, (column) => `${column}::text`);
}
