import 'reflect-metadata';
import { DataSource } from 'typeorm';
import { entities } from './entities';
import { migrations } from './migrations';

/** The open connection pool of one database role. */
export interface Database {
  readonly dataSource: DataSource;
  close(): Promise<void>;
}

export interface DatabaseOptions {
  readonly url: string;
  readonly poolSize?: number;
  /** Shown by PostgreSQL beside each connection. */
  readonly applicationName?: string;
}

/** Builds a TypeORM data source; `synchronize` is never used and parameters are never logged. */
export function makeDataSource(options: DatabaseOptions): DataSource {
  return new DataSource({
    type: 'postgres',
    url: options.url,
    entities,
    migrations,
    migrationsTableName: 'schema_migration',
    synchronize: false,
    logging: false,
    applicationName: options.applicationName ?? 'trayward',
    poolSize: options.poolSize ?? 12,
    // A unit of work that takes a second connection would otherwise hang for ever when the pool is empty.
    extra: { connectionTimeoutMillis: 10_000, idle_in_transaction_session_timeout: 60_000, statement_timeout: 30_000 },
  });
}

export async function openDatabase(options: DatabaseOptions): Promise<Database> {
  const dataSource = await makeDataSource(options).initialize();
  return { dataSource, close: () => dataSource.destroy() };
}
