import { api } from '../api/client.ts';
import { FormTrouble } from '../parts/notice.tsx';
import { PageHead } from '../parts/page-head.tsx';
import { useForm } from '../state/form.ts';
import { useShell } from '../state/shell.tsx';
import { REMINDER, SITE_CAUTIONS } from '../words/cautions.ts';
import { HabitFields, newSiteOf, PlaceFields, siteFields } from './site-fields.tsx';
import { TwelvePairs } from './twelve-pairs.tsx';

/** Makes a site; the first thing there is to do. */
export function NewSitePage({ isFirst }: { isFirst: boolean }) {
  const { go, to, reload } = useShell();
  const form = useForm(siteFields(null, Intl.DateTimeFormat().resolvedOptions().timeZone));
  const make = async () => {
    const site = await form.send((read) => api.addSite(newSiteOf(read)));
    if (!site) return;
    await reload();
    go(to('/', { siteId: site.id }));
  };
  return (
    <div class="narrow">
      <PageHead title={isFirst ? 'Where do your lights stand?' : 'Another site'} />
      <p class="lead lead-soft">
        {isFirst
          ? 'From the place come the length of each night and its cold; from your props and swaps, which of them go dim before you can reach them.'
          : 'Its own place, season, props and rounds.'}
      </p>
      <form
        class="sheet"
        onSubmit={(event) => {
          event.preventDefault();
          void make();
        }}
      >
        <FormTrouble text={form.trouble} />
        <h2>The place</h2>
        <PlaceFields form={form} />
        <TwelvePairs form={form} />
        <h2>Rounds</h2>
        <HabitFields form={form} />
        <aside class="cautions" aria-label="Before you start">
          <ul>
            {SITE_CAUTIONS.map((caution) => (
              <li key={caution}>{caution}</li>
            ))}
          </ul>
          <p class="soft">{REMINDER}</p>
        </aside>
        <button type="submit" class="button-main" aria-disabled={form.busy}>
          Make this site
        </button>
      </form>
    </div>
  );
}
