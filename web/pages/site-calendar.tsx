import { useState } from 'preact/hooks';
import { api } from '../api/client.ts';
import type { CalendarLink, MadeCalendarLink, Site } from '../api/types.ts';
import { TextField, TickField } from '../parts/field.tsx';
import { FormTrouble, Status, Trouble } from '../parts/notice.tsx';
import { useForm } from '../state/form.ts';
import { useRead } from '../state/read.ts';
import { shortMomentWords } from '../words/time.ts';

/** Secret addresses under which a calendar finds the rounds: made, shown once, taken back. */
export function SiteCalendar({ site }: { site: Site }) {
  const links = useRead(`calendar-links ${site.id}`, () => api.calendarLinks(site.id));
  const [made, setMade] = useState<MadeCalendarLink | null>(null);
  const [withAlarms, setWithAlarms] = useState(false);
  const form = useForm({ label: '' });
  const make = async () => {
    const link = await form.send((read) => {
      const label = read.optionalText('label');
      return api.addCalendarLink(site.id, { ...(label ? { label } : {}), alarms: withAlarms });
    });
    if (!link) return;
    setMade(link);
    form.reset({ label: '' });
    await links.again();
  };
  const revoke = async (linkId: string) => {
    await api.removeCalendarLink(site.id, linkId);
    if (made?.id === linkId) setMade(null);
    await links.again();
  };

  return (
    <section class="sheet" aria-labelledby="calendar-title">
      <h2 id="calendar-title">Calendar links</h2>
      <p>
        A link lets somebody's calendar show the rounds. Whoever has it can read them, so make one for each
        person and take it back when they leave.
      </p>
      {links.problem && <Trouble problem={links.problem} onAgain={() => void links.again()} />}
      <ul class="links">
        {(links.value ?? []).map((link) => (
          <LinkLine
            key={link.id}
            link={link}
            timeZone={site.timeZone}
            onTakeBack={() => void revoke(link.id)}
          />
        ))}
      </ul>
      <Status>{made && <MadeLink made={made} />}</Status>
      <form
        onSubmit={(event) => {
          event.preventDefault();
          void make();
        }}
      >
        <FormTrouble text={form.trouble} />
        <TextField
          label="For whom"
          optional
          value={form.fields.label}
          onText={(text) => form.set('label', text)}
          fault={form.faults.label}
        />
        <TickField
          label="With an alarm half an hour before (many calendars leave it out)"
          checked={withAlarms}
          onTick={setWithAlarms}
        />
        <button type="submit">Make a link</button>
      </form>
      <p class="soft">
        Calendars ask again when they like: some every hour, some once a day. What changes today may arrive
        tomorrow; these pages are the truth. An online calendar fetches from its own servers and cannot reach
        an address inside your own network; only a program on the same network can.
      </p>
    </section>
  );
}

type LinkLineProps = { link: CalendarLink; timeZone: string; onTakeBack: () => void };

function LinkLine({ link, timeZone, onTakeBack }: LinkLineProps) {
  return (
    <li>
      <span>
        {link.label ?? 'without a name'}
        {link.alarms && ', with alarms'}
        <span class="soft">
          made {shortMomentWords(Date.parse(link.createdAt), timeZone)};{' '}
          {link.lastReadAt
            ? `last read ${shortMomentWords(Date.parse(link.lastReadAt), timeZone)}`
            : 'never read yet'}
        </span>
      </span>
      <button
        type="button"
        class="quiet"
        onClick={onTakeBack}
        aria-label={`Take back the link ${link.label ?? 'without a name'}`}
      >
        Take back
      </button>
    </li>
  );
}

function MadeLink({ made }: { made: MadeCalendarLink }) {
  const [copied, setCopied] = useState(false);
  // The clipboard exists on https and localhost only; elsewhere the field is there to copy from.
  const canCopy = 'clipboard' in navigator;
  return (
    <div class="notice notice-done">
      <p>
        <strong>Shown this once.</strong> Copy it now; it cannot be shown again.
      </p>
      <input
        class="secret"
        type="text"
        readOnly
        value={made.url}
        aria-label="Calendar link"
        onFocus={(event) => event.currentTarget.select()}
      />
      {canCopy && (
        <button
          type="button"
          class="quiet"
          onClick={() => {
            void navigator.clipboard.writeText(made.url).then(() => setCopied(true));
          }}
        >
          {copied ? 'Copied' : 'Copy'}
        </button>
      )}
    </div>
  );
}
