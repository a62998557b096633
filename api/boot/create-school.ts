import 'reflect-metadata';
import { parseArgs } from 'node:util';
import { z } from 'zod';
import { createDataSource, migrate } from '../db/data-source.ts';
import { createInvitation } from '../features/classes/joining.service.ts';
import { School } from '../features/people/people.entity.ts';
import { ConfigError, readConfig } from '../lib/config.ts';
import { timeZoneSchema } from '../../shared/schemas/class.ts';
import { emailSchema } from '../../shared/schemas/people.ts';

const USAGE = `npm run school -- --name "Name of the school" --time-zone Europe/Oslo --admin-name "Name" --admin-email name@example.org
Makes a school and prints the link with which its first admin makes an account. The link works once, within two days.`;

const argumentsSchema = z.object({
  name: z.string().trim().min(1, 'write the name of the school').max(120),
  'time-zone': timeZoneSchema,
  'admin-name': z.string().trim().min(1, 'write the name of the admin').max(80),
  'admin-email': emailSchema,
});

async function main(): Promise<void> {
  const { values } = parseArgs({
    options: {
      name: { type: 'string' },
      'time-zone': { type: 'string' },
      'admin-name': { type: 'string' },
      'admin-email': { type: 'string' },
    },
  });
  const read = argumentsSchema.safeParse(values);
  if (!read.success) {
    const lines = read.error.issues.map((issue) => `  --${issue.path.join('.')}: ${issue.message}`);
    throw new ConfigError(`${USAGE}\n\n${lines.join('\n')}`);
  }
  const config = readConfig();
  const db = createDataSource(config.databaseUrl);
  await db.initialize();
  try {
    await migrate(db);
    const token = await db.transaction(async (manager) => {
      if (await manager.existsBy(School, { name: read.data.name }))
        throw new ConfigError(`There is a school called ${read.data.name} already.`);
      const school = await manager.save(
        manager.create(School, { name: read.data.name, timeZone: read.data['time-zone'], createdAt: new Date() }),
      );
      return await createInvitation(manager, {
        schoolId: school.id,
        classId: null,
        role: 'admin',
        name: read.data['admin-name'],
        email: read.data['admin-email'],
        createdById: null,
        asksToJoin: false,
        expiresAt: new Date(Date.now() + 2 * 86_400_000),
      });
    });
    process.stdout.write(`Open this within two days to make the admin's account:\n${config.baseUrl}/join/${token}\n`);
  } finally {
    await db.destroy();
  }
}

try {
  await main();
} catch (error) {
  process.stderr.write(
    `${error instanceof ConfigError ? error.message : String(error instanceof Error ? error.stack : error)}\n`,
  );
  process.exitCode = 1;
}
