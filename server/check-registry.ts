import { openDatabase } from '../db/client';
import { withInstallationDatabase } from './launch/one-off';
import { tell } from './launch/say';
import { checkRegistry, everyGroup, type RegistryReport } from './services/registry-check';

/**
 * `npm run check:registry`: rebuilds every group's objects from its verdicts alone and compares. One line per
 * group; exit code 1 when anything differs.
 */
async function main(databaseUrl: string): Promise<number> {
  const database = openDatabase(
    databaseUrl,
    (error) => console.error(`connection lost: ${error.message}`),
    2,
  );
  try {
    const groups = await everyGroup(database);
    if (groups.length === 0) console.log('No groups yet: nothing to check.');
    let broken = 0;
    for (const group of groups) {
      const report = await checkRegistry(database, group);
      print(report);
      if (report.differenceCount > 0) broken += 1;
    }
    return broken === 0 ? 0 : 1;
  } finally {
    await database.close();
  }
}

function print(report: RegistryReport): void {
  const sizes = `${report.objects} objects (${report.liveObjects} live), ${report.verdictsInForce} verdicts in force, ${report.conflicts} conflicts`;
  const result =
    report.differenceCount === 0 ? 'the same as rebuilt' : `${report.differenceCount} DIFFERENCES`;
  console.log(`${report.group}: ${sizes}: ${result}`);
  for (const difference of report.differences) console.log(`  ${difference}`);
  const hidden = report.differenceCount - report.differences.length;
  if (hidden > 0) console.log(`  ... and ${hidden} more`);
}

try {
  process.exitCode = await withInstallationDatabase(process.env, main);
} catch (error) {
  tell(error);
  process.exitCode = 1;
}
