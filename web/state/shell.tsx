import { type ComponentChildren, createContext } from 'preact';
import { useContext, useEffect, useMemo, useState } from 'preact/hooks';
import { api } from '../api/client.ts';
import type { Health, Problem, Site } from '../api/types.ts';
import { eveningAhead } from '../words/time.ts';
import { now } from './clock.ts';
import { useRead } from './read.ts';
import { addressOf, type Place, readPlace } from './route.ts';

/** What every page needs to know: where it is, whose site, as of when. */
export type Shell = {
  place: Place;
  /** Address of a path, with the chosen site and moment kept. */
  to: (path: string, changes?: { siteId?: string | null; asOf?: string | null }) => string;
  go: (address: string, how?: { replace?: boolean }) => void;
  health: Health | null;
  sites: Site[] | null;
  site: Site | null;
  problem: Problem | null;
  /** Passed to reads; null = the server's own clock. */
  asOf: string | null;
  /** The moment shown, epoch milliseconds. */
  momentAt: number;
  /** The night meant by tonight at that moment, in the site's zone. */
  tonight: string;
  reload: () => Promise<void>;
};

const ShellContext = createContext<Shell | null>(null);

/** @throws when used outside of `ShellFrame`: a slip of ours */
export function useShell(): Shell {
  const shell = useContext(ShellContext);
  if (!shell) throw new Error('useShell needs a ShellFrame around it');
  return shell;
}

const here = () => readPlace(location.pathname + location.search);

export function ShellFrame({ children }: { children: ComponentChildren }) {
  const [place, setPlace] = useState(here);
  const health = useRead('health', api.health);
  const sites = useRead('sites', api.sites);
  const minute = useMinute();

  useEffect(() => {
    const onMove = () => setPlace(here());
    addEventListener('popstate', onMove);
    return () => removeEventListener('popstate', onMove);
  }, []);

  const site = sites.value?.find(({ id }) => id === place.siteId) ?? sites.value?.[0] ?? null;
  const shell = useMemo<Shell>(() => {
    const momentAt = momentOf(place.asOf, health.value?.asOf ?? null) ?? minute;
    return {
      place,
      to: (path, changes) => addressOf(path, place, changes),
      go: (address, how) => {
        if (how?.replace) history.replaceState(null, '', address);
        else history.pushState(null, '', address);
        const next = here();
        if (next.route.page !== place.route.page && !how?.replace) scrollTo(0, 0);
        setPlace(next);
      },
      health: health.value,
      sites: sites.value,
      site,
      problem: sites.problem ?? health.problem,
      asOf: place.asOf,
      momentAt,
      tonight: eveningAhead(momentAt, site?.timeZone ?? 'UTC'),
      reload: async () => {
        await Promise.all([health.again(), sites.again()]);
      },
    };
  }, [place, health.value, sites.value, sites.problem, health.problem, site, minute]);

  return <ShellContext.Provider value={shell}>{children}</ShellContext.Provider>;
}

function momentOf(...candidates: (string | null)[]): number | null {
  for (const text of candidates) {
    const at = text === null ? Number.NaN : Date.parse(text);
    if (!Number.isNaN(at)) return at;
  }
  return null;
}

/** The time of day, renewed every minute, so that a page left open turns over to the next evening by itself. */
function useMinute(): number {
  const [at, setAt] = useState(now);
  useEffect(() => {
    const timer = setInterval(() => setAt(now()), 60_000);
    return () => clearInterval(timer);
  }, []);
  return at;
}
