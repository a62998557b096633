import { composeServices } from '../../api/services.ts';
import { createDataSource, migrate } from '../../api/db/data-source.ts';
import { createPlatform } from './platform.ts';

/** Migrates the database, and lays out the job queues in it, once for all tests. */
export async function prepareTemplate(url: string): Promise<void> {
  const dataSource = createDataSource(url, 2);
  await dataSource.initialize();
  try {
    await migrate(dataSource);
    const { platform, close } = await createPlatform(dataSource, url);
    await platform.queue.prepare(composeServices(platform).jobs);
    await close();
  } finally {
    await dataSource.destroy();
  }
}
