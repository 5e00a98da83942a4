import type { ComponentChildren } from 'preact';
import { useShell } from '../state/shell.tsx';
import { THEMES, type Theme, useTheme } from '../state/theme.ts';
import { MomentStrip } from './day-stepper.tsx';
import { Link } from './link.tsx';

const THEME_WORDS: Record<Theme, { word: string; about: string }> = {
  day: { word: 'Day', about: 'Light paper, for sunlight' },
  night: { word: 'Night', about: 'Night-blue paper' },
  red: { word: 'Red', about: 'Red on black, for eyes used to the dark' },
};

/** What stands around every page. */
export function Frame({ children }: { children: ComponentChildren }) {
  const { place, site, problem, reload } = useShell();
  const { page } = place.route;
  const isProps = page === 'props' || page === 'prop' || page === 'new-prop' || page === 'change-prop';
  return (
    <>
      <a class="skip" href="#main">
        To the page
      </a>
      <header class="top">
        <Link path="/" class="word-mark" label="Duskround, tonight">
          <WordMark />
          <span>Duskround</span>
        </Link>
        <SiteName />
        <ThemeSwitch />
      </header>
      {site && (
        <nav class="pages" aria-label="Pages">
          <Link path="/" current={page === 'tonight'}>
            Tonight
          </Link>
          <Link path="/props" current={isProps}>
            Props
          </Link>
          <Link path="/site" current={page === 'site' || page === 'new-site'}>
            Site
          </Link>
        </nav>
      )}
      <MomentStrip />
      {problem && site && (
        <p class="strip-trouble" role="alert">
          {problem.title}. What you see is the last that came.{' '}
          <button type="button" class="quiet" onClick={() => void reload()}>
            Try again
          </button>
        </p>
      )}
      <main id="main" tabIndex={-1}>
        {children}
      </main>
      <footer class="foot">
        <p>
          Dates are ranges meant to hold four times in five. They tell when to look, not that a light will
          burn: nobody should have to find the way by a decoration.
        </p>
      </footer>
    </>
  );
}

/** Three strands of unlike length: the wick, small. */
function WordMark() {
  return (
    <svg viewBox="0 0 26 20" width="26" height="20" aria-hidden="true" class="word-mark-sign">
      <path class="word-mark-lit" d="M2 4H17M2 10H24M2 16H12" />
      <path class="word-mark-open" d="M21 4H24M16 16H24" />
    </svg>
  );
}

function SiteName() {
  const { sites, site, to, go } = useShell();
  if (!site || !sites) return null;
  if (sites.length === 1) return <span class="site-name">{site.name}</span>;
  return (
    <label class="site-name">
      <span class="unseen">Site</span>
      <select value={site.id} onChange={(event) => go(to('/', { siteId: event.currentTarget.value }))}>
        {sites.map(({ id, name }) => (
          <option key={id} value={id} selected={id === site.id}>
            {name}
          </option>
        ))}
      </select>
    </label>
  );
}

function ThemeSwitch() {
  const [theme, choose] = useTheme();
  return (
    <fieldset class="themes">
      <legend class="unseen">Colours; pressed again, a choice goes back to what this device says</legend>
      {THEMES.map((one) => (
        <button
          key={one}
          type="button"
          aria-pressed={theme === one}
          title={THEME_WORDS[one].about}
          onClick={() => choose(one)}
        >
          {THEME_WORDS[one].word}
        </button>
      ))}
    </fieldset>
  );
}
