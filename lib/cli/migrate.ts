import { migrate } from '@/models/migrate';

try {
  const { file, applied, backup } = await migrate();
  if (backup) console.log(`Copied the database as it was to ${backup}`);
  console.log(applied.length > 0 ? `${file}: ran ${applied.join(', ')}` : `${file}: nothing to migrate`);
} catch (error) {
  console.error(`The database was not migrated and is as before: ${error instanceof Error ? error.message : String(error)}`);
  process.exitCode = 1;
}
