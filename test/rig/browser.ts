import { accessSync, constants } from 'node:fs';
import path from 'node:path';
import { type Browser, chromium, type LaunchOptions } from 'playwright-core';

const ON_PATH = ['chromium', 'chromium-browser', 'google-chrome', 'google-chrome-stable'];
const CHANNELS = ['chrome', 'msedge'];

/** Nothing that asks the network or the screen for anything. */
const FLAGS = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
  '--no-first-run',
];

function onPath(): string | null {
  for (const folder of (process.env.PATH ?? '').split(path.delimiter)) {
    for (const name of ON_PATH) {
      const file = path.join(folder, name);
      try {
        accessSync(file, constants.X_OK);
        return file;
      } catch {
        // Not in this folder.
      }
    }
  }
  return null;
}

/**
 * A browser of this machine: BROWSER_PATH, else a Chromium or Chrome on the PATH, else an installed Chrome or Edge.
 * @throws with the line that installs one: a test that cannot look fails, it does not pass unseen
 */
export async function openBrowser(): Promise<Browser> {
  const executablePath = process.env.BROWSER_PATH ?? onPath();
  if (executablePath) return chromium.launch({ executablePath, args: FLAGS });
  for (const channel of CHANNELS) {
    const options: LaunchOptions = { channel, args: FLAGS };
    try {
      return await chromium.launch(options);
    } catch {
      // Not installed; the next may be.
    }
  }
  throw new Error(
    'No browser found for the browser tests. Install one (Debian: apt-get install -y --no-install-recommends chromium) or set BROWSER_PATH to one.',
  );
}
