import { randomBytes } from 'node:crypto';
import { afterAll, beforeAll, expect, inject, it } from 'vitest';
import type { DataSource } from 'typeorm';
import { createDataSource, migrate } from '../../api/db/data-source.ts';

const name = `m_${randomBytes(6).toString('hex')}`;
let admin: DataSource;
let dataSource: DataSource;

beforeAll(async () => {
  const { adminUrl } = inject('testDatabase');
  admin = await createDataSource(adminUrl, 1).initialize();
  await admin.query(`create database ${name}`);
  const url = new URL(adminUrl);
  url.pathname = `/${name}`;
  dataSource = await createDataSource(url.href, 4).initialize();
});

afterAll(async () => {
  await dataSource.destroy();
  await admin.query(`drop database ${name} with (force)`);
  await admin.destroy();
});

it('runs up to exactly the schema that the entities describe', async () => {
  await migrate(dataSource);
  const { upQueries } = await dataSource.driver.createSchemaBuilder().log();
  expect(upQueries.map(({ query }) => query)).toEqual([]);
});

it('runs down to nothing, and up again', async () => {
  for (const _ of dataSource.migrations) await dataSource.undoLastMigration();
  const left: unknown = await dataSource.query(
    `select table_name from information_schema.tables where table_schema = 'public' and table_name <> 'migrations'`,
  );
  expect(left).toEqual([]);
  await migrate(dataSource);
});

it('lets two processes migrate at the same moment', async () => {
  for (const _ of dataSource.migrations) await dataSource.undoLastMigration();
  await Promise.all([migrate(dataSource), migrate(dataSource)]);
  expect(await dataSource.showMigrations()).toBe(false);
});
