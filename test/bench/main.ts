import { benchForecast } from './forecast.ts';
import { benchSun } from './sun.ts';

const BENCHES: Record<string, () => void | Promise<void>> = { sun: benchSun, forecast: benchForecast };

// `npm run bench` runs all; `npm run bench -- sun` one.
const asked = process.argv.slice(2);
const unknown = asked.filter((name) => !(name in BENCHES));
if (unknown.length > 0) {
  console.error(`There is no bench "${unknown.join(', ')}": they are ${Object.keys(BENCHES).join(', ')}.`);
  process.exit(1);
}
console.log(`Node ${process.version}; a busy machine slows both sides, so trust the ratios.\n`);
for (const [name, run] of Object.entries(BENCHES)) {
  if (asked.length > 0 && !asked.includes(name)) continue;
  console.log(`${name} …`);
  await run();
  console.log();
}
