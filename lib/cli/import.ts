// npm run import: reference trees from a CSV file into a project.
import { readFile } from 'node:fs/promises';
import path from 'node:path';
import { pathToFileURL } from 'node:url';
import { closeDatabase } from '@/models';
import { IMPORT_USAGE, parseImportArguments } from './import/parse-import-arguments';
import { runImport } from './import/run-import';

async function main(): Promise<number> {
  const parsed = parseImportArguments(process.argv.slice(2));
  if (parsed.kind === 'help') {
    console.log(IMPORT_USAGE);
    return 0;
  }
  if (parsed.kind === 'usage') {
    console.error(`${parsed.faults.join('\n')}\n\n${IMPORT_USAGE}`);
    return 2;
  }
  let bytes: Buffer;
  try {
    bytes = await readFile(parsed.arguments.file);
  } catch {
    console.error(`The file ${parsed.arguments.file} cannot be read.`);
    return 1;
  }
  try {
    const { ok, lines } = await runImport(parsed.arguments, { fileName: path.basename(parsed.arguments.file), bytes });
    for (const line of lines) (ok ? console.log : console.error)(line);
    return ok ? 0 : 1;
  } finally {
    await closeDatabase();
  }
}

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) {
  process.exitCode = await main().catch((error: unknown) => {
    console.error(error instanceof Error ? error.message : error);
    return 1;
  });
}
