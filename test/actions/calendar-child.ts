// A process of its own, in a time zone of its own, that reads a calendar and prints it.

import { readCalendar } from '../../server/actions/read-calendar.ts';
import { fixedClock } from '../../server/clock.ts';
import { openStore } from '../../server/store/open.ts';

const [file, secret, at] = process.argv.slice(2) as [string, string, string];
const store = openStore(file);
let count = 0;
const newId = () => `told-${++count}`;
const calendar = readCalendar({ store, clock: fixedClock(Number(at)), newId, newSecret: newId }, { secret });
store.close();
// getTimezoneOffset shows that the process truly is where it was put.
const offsetMinutes = new Date(Number(at)).getTimezoneOffset();
process.stdout.write(JSON.stringify({ offsetMinutes, calendar }));
