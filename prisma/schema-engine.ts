/**
 * Prisma's own schema engine, in WebAssembly: the same tables, checksums and SQL as its command line, without a download.
 * Its command line can take over at any time.
 */
import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import { dirname, join } from 'node:path';
import { bindMigrationAwareSqlAdapterFactory } from '@prisma/driver-adapter-utils';
import type { SchemaEngine, SchemasContainer } from '@prisma/schema-engine-wasm/schema_engine_bg';
import * as binding from '@prisma/schema-engine-wasm/schema_engine_bg';
import { createEngineAdapter, type EngineDatabases } from './engine-adapter';

export type { SchemaEngine };

/** Name under which the WebAssembly module asks for its JavaScript half. */
const BINDING_NAME = './schema_engine_bg.js';
const WASM_FILE = 'schema_engine_bg.wasm';

let isLoaded = false;

/**
 * Runs `work` with an engine and ends its connections afterwards.
 * @param schema the schema's files; needed to compare, not to apply migrations
 */
export async function withSchemaEngine<T>(
  databases: EngineDatabases,
  schema: SchemasContainer | null,
  work: (engine: SchemaEngine) => Promise<T>,
): Promise<T> {
  if (!isLoaded) loadEngine();
  const adapter = createEngineAdapter(databases);
  const datamodels = schema?.files.map(({ path, content }): [string, string] => [path, content]);
  const ignoreLog = () => {};
  try {
    const factory = bindMigrationAwareSqlAdapterFactory(adapter.factory);
    const engine = await binding.SchemaEngine.new({ datamodels }, ignoreLog, factory);
    try {
      return await work(engine);
    } finally {
      engine.free();
    }
  } finally {
    await adapter.close();
  }
}

function loadEngine(): void {
  const resolve = createRequire(import.meta.url).resolve;
  const folder = dirname(resolve('@prisma/schema-engine-wasm/schema_engine_bg'));
  const module = new WebAssembly.Module(readFileSync(join(folder, WASM_FILE)));
  const { exports } = new WebAssembly.Instance(module, {
    [BINDING_NAME]: binding as unknown as WebAssembly.ModuleImports,
  });
  binding.__wbg_set_wasm(exports);
  (exports.__wbindgen_start as () => void)();
  isLoaded = true;
}
