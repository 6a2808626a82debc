import { clientFigures } from './client-figures';
import { engineFigures } from './engine-figures';
import type { Figure } from './figure';
import { importFigures } from './import-figures';
import { openBenchServer } from './bench-server';
import { matchFigures } from './match-figures';
import { searchFigures } from './search-figures';

/**
 * `npm run bench`: one line per figure; `-- --json` prints the same as one JSON array and nothing else;
 * `-- --only NAME` runs one figure (with what it needs before it).
 */
const args = process.argv.slice(2);
const asJson = args.includes('--json');
const onlyAt = args.indexOf('--only');
const only = onlyAt === -1 ? null : args[onlyAt + 1];

const NAMES = {
  client: ['client-first-load'],
  engine: ['engine-cone-match', 'engine-cone-p99'],
  import: ['import-million-rows', 'import-worker-memory', 'import-registered'],
  match: ['match-million-million'],
  search: ['search-name-p99', 'search-cone-p99'],
};

function wanted(part: keyof typeof NAMES): boolean {
  return only === null || only === undefined || NAMES[part].includes(only);
}

function print(figure: Figure): void {
  if (asJson) return;
  const number = (value: number) => value.toPrecision(4);
  process.stdout.write(
    `${figure.met ? 'met   ' : 'MISSED'}  ${figure.name}: ${number(figure.value)} ${figure.unit}; baseline ${figure.baseline}: ` +
      `${number(figure.baselineValue)}; ratio ${number(figure.ratio)}; goal ${figure.goal}\n` +
      `        data: ${figure.data}; again: ${figure.repeat}\n`,
  );
}

const figures: Figure[] = [];
const take = (more: Figure[]) => {
  const kept = more.filter((figure) => only === null || only === undefined || figure.name === only);
  figures.push(...kept);
  kept.forEach(print);
};

if (only !== null && only !== undefined && !Object.values(NAMES).flat().includes(only)) {
  process.stderr.write(`There is no figure ${only}; the figures are ${Object.values(NAMES).flat().join(', ')}.\n`);
  process.exit(2);
}
if (wanted('client')) take(await clientFigures());
if (wanted('engine')) take(await engineFigures());
if (wanted('import') || wanted('match') || wanted('search')) {
  const server = await openBenchServer();
  try {
    // The later figures stand on the catalogue that the import figure brings in.
    take(await importFigures(server));
    if (wanted('search')) take(await searchFigures(server));
    if (wanted('match')) take(await matchFigures(server));
  } finally {
    await server.close();
  }
}
if (asJson) process.stdout.write(`${JSON.stringify(figures, null, 2)}\n`);
