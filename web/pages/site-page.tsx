import { useState } from 'preact/hooks';
import { api } from '../api/client.ts';
import type { Site, SiteChanges } from '../api/types.ts';
import { Link } from '../parts/link.tsx';
import { FormTrouble, Status, Trouble, Waiting } from '../parts/notice.tsx';
import { PageHead } from '../parts/page-head.tsx';
import { type Reader, useForm } from '../state/form.ts';
import { forgetAnswers, useRead } from '../state/read.ts';
import { useShell } from '../state/shell.tsx';
import { REMINDER, SITE_CAUTIONS } from '../words/cautions.ts';
import { SeasonBand } from './season-band.tsx';
import { SiteCalendar } from './site-calendar.tsx';
import { HabitFields, habitsOf, PlaceFields, placeOf, siteFields, twelveOf } from './site-fields.tsx';
import { SiteShowNights } from './site-show-nights.tsx';
import { SiteWeather } from './site-weather.tsx';
import { TwelvePairs } from './twelve-pairs.tsx';

/** Everything that belongs to the place rather than to one prop. */
export function SitePage({ site }: { site: Site }) {
  const { asOf, tonight } = useShell();
  const nights = useRead(`nights ${site.id} ${asOf}`, () => api.nights(site.id, asOf));
  const readAgain = () => {
    forgetAnswers();
    void nights.again();
  };
  return (
    <div class="site">
      <PageHead title={site.name}>
        <Link path="/site/new" class="button button-plain">
          Another site
        </Link>
      </PageHead>
      {nights.problem && <Trouble problem={nights.problem} onAgain={() => void nights.again()} />}
      {!nights.value && !nights.problem && <Waiting what="the season's nights" />}
      {nights.value && <SeasonBand nights={nights.value} site={site} tonight={tonight} />}
      <div class="site-columns">
        <SiteShowNights site={site} onSaved={readAgain} />
        <SiteWeather site={site} nights={nights.value ?? []} tonight={tonight} onSaved={readAgain} />
        <PlaceForm site={site} onSaved={readAgain} />
        <SiteCalendar site={site} />
        <section class="sheet" aria-labelledby="duty-title">
          <h2 id="duty-title">Safety and duty</h2>
          <ul>
            {SITE_CAUTIONS.map((caution) => (
              <li key={caution}>{caution}</li>
            ))}
          </ul>
          <p class="soft">{REMINDER}</p>
        </section>
      </div>
    </div>
  );
}

type Make = (read: Reader) => SiteChanges;

function PlaceForm({ site, onSaved }: { site: Site; onSaved: () => void }) {
  const { reload } = useShell();
  const form = useForm(siteFields(site, site.timeZone));
  const [said, setSaid] = useState('');
  const save = async (part: string, make: Make) => {
    const saved = await form.send((read) => api.changeSite(site.id, make(read)));
    setSaid(saved ? `${part} saved.` : '');
    if (!saved) return;
    onSaved();
    await reload();
  };
  const submitting = (part: string, make: Make) => (event: Event) => {
    event.preventDefault();
    void save(part, make);
  };
  return (
    <section class="sheet" aria-labelledby="place-title">
      <h2 id="place-title">Place and rounds</h2>
      <FormTrouble text={form.trouble} />
      <details>
        <summary>Place and season</summary>
        <form onSubmit={submitting('Place', placeOf)}>
          <PlaceFields form={form} />
          <button type="submit">Save place</button>
        </form>
      </details>
      <details>
        <summary>Usual temperatures</summary>
        <form onSubmit={submitting('Temperatures', twelveOf)}>
          <TwelvePairs form={form} />
          <button type="submit">Save temperatures</button>
        </form>
      </details>
      <details>
        <summary>Rounds, confidence, zones</summary>
        <form onSubmit={submitting('Rounds', habitsOf)}>
          <HabitFields form={form} />
          <button type="submit">Save rounds</button>
        </form>
      </details>
      <Status>{said}</Status>
    </section>
  );
}
