import 'reflect-metadata';
import { DataSource } from 'typeorm';
import { entities } from './entities.ts';
import { migrations } from './migrations.ts';
import { NamingStrategy } from './naming-strategy.ts';

/** Opens nothing yet; call `initialize`. `poolSize` counts connections of this process. */
export function createDataSource(databaseUrl: string, poolSize = 10): DataSource {
  return new DataSource({
    type: 'postgres',
    url: databaseUrl,
    entities,
    migrations,
    migrationsTransactionMode: 'each',
    namingStrategy: new NamingStrategy(),
    synchronize: false,
    logging: false,
    poolSize,
    applicationName: 'slipstone',
    // A lost connection is reported by the query that needed it; the pool must not end the process.
    poolErrorHandler: () => undefined,
    extra: { statement_timeout: 30_000, idle_in_transaction_session_timeout: 60_000 },
  });
}

/** Any number that is ours alone: two processes that start together must not migrate at once. */
const MIGRATION_LOCK = 4_600_001;

/** Runs the migrations that are missing; safe when several processes start together. */
export async function migrate(dataSource: DataSource): Promise<void> {
  const holder = dataSource.createQueryRunner();
  try {
    await holder.query('select pg_advisory_lock($1)', [MIGRATION_LOCK]);
    await dataSource.runMigrations();
  } finally {
    await holder.query('select pg_advisory_unlock($1)', [MIGRATION_LOCK]);
    await holder.release();
  }
}
