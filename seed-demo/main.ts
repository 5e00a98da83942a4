import { spawn } from 'node:child_process';
import { rmSync } from 'node:fs';
import { createServer } from 'node:net';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { forecastSite } from '../server/actions/forecast-site.ts';
import { packageRoot, readConfig } from '../server/config.ts';
import { parseInstant } from '../server/model/evening.ts';
import { eveningWords } from '../server/planning/evening-words.ts';
import { openStore } from '../server/store/open.ts';
import { demoDeps } from './deps.ts';
import { DEMO_AS_OF, playSeason } from './season.ts';
import { swapTable } from './swap-table.ts';

const { port, host } = readConfig();
if (!(await isFree(port, host))) {
  console.error(
    `Port ${port} is in use already, perhaps by another demo. Close that, or set DUSKROUND_PORT.`,
  );
  process.exit(1);
}

// A fresh demo each time: the same bytes whenever it is run. Your own database is never touched.
const db = path.join(packageRoot(), 'data', 'demo.db');
for (const ending of ['', '-wal', '-shm']) rmSync(`${db}${ending}`, { force: true });

console.log('Building the demo: Pellmoss Lantern Lane, an invented lantern walk …');
const store = openStore(db);
const deps = demoDeps(store);
const siteId = playSeason(deps);
const asOf = parseInstant(DEMO_AS_OF)!;
const forecast = forecastSite(deps, { siteId, asOf });
console.log(`\nPellmoss Lantern Lane as of ${eveningWords(forecast.evening)} 2026, 09:00`);
console.log(`Next round: ${forecast.nextRound ? eveningWords(forecast.nextRound) : 'none planned'}\n`);
console.log(swapTable(forecast));
console.log('\nReminders, not assurance: the rules of your place, your insurer and your venue come first.\n');
store.close();

const server = path.join(path.dirname(fileURLToPath(import.meta.url)), '..', 'server', 'main.js');
const child = spawn(process.execPath, [server], {
  stdio: 'inherit',
  env: { ...process.env, DUSKROUND_DB: db, DUSKROUND_AS_OF: DEMO_AS_OF },
});
for (const signal of ['SIGINT', 'SIGTERM'] as const) process.on(signal, () => child.kill(signal));
child.on('exit', (code) => process.exit(code ?? 0));

/** Asked before anything is thrown away: another demo may be serving the file. */
function isFree(wanted: number, at: string): Promise<boolean> {
  return new Promise((resolve) => {
    const probe = createServer();
    probe.once('error', () => resolve(false));
    probe.listen(wanted, at, () => probe.close(() => resolve(true)));
  });
}
