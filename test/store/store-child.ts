// A process of its own that opens a database and, when told to, writes until it is killed.

import { insertEntry } from '../../server/store/log.ts';
import { openStore } from '../../server/store/open.ts';
import { insertProp } from '../../server/store/props.ts';
import { insertSite } from '../../server/store/sites.ts';
import { sampleProp, sampleSite, sampleSwap } from './samples.ts';

const [deed, file] = process.argv.slice(2) as ['open' | 'write', string];

function say(line: string): void {
  process.stdout.write(`${line}\n`);
}

// All children load their code first, then start together on one word from the parent.
process.stdin.once('data', () => {
  const store = openStore(file);
  if (deed === 'open') {
    say(`schema ${store.schemaVersion}`);
    store.close();
    process.exit(0);
  }
  insertSite(store.db, sampleSite);
  insertProp(store.db, sampleProp);
  let count = 0;
  const writeNext = () => {
    const id = `swap-${count++}`;
    store.transact((db) => insertEntry(db, { ...sampleSwap, id }));
    say(id);
    setImmediate(writeNext);
  };
  writeNext();
});
say('ready');
