import type { SiteForecastProp } from '../api/types.ts';
import { sign } from '../drawing/sign.ts';
import { wick } from '../drawing/wick.ts';
import { wickOfProp, wickWords } from '../drawing/wick-of-prop.ts';
import { Link } from '../parts/link.tsx';
import { GROUP_WORDS, IMPORTANCE_WORDS } from '../words/names.ts';
import { dimWords, swapByWords } from '../words/range.ts';

type PropRowProps = {
  prop: SiteForecastProp;
  tonight: string;
  nextRound: string | null;
  /** With its sign, where the heading above does not already say the group. */
  withSign?: boolean;
  /** A note said for the whole group already. */
  saidAbove?: string | null;
};

/** How a wick is read, once per page. */
export function WickKey() {
  return (
    <ul class="key" aria-label="How to read a wick">
      <li>
        <span class="key-swatch key-strands" /> left of a full set
      </li>
      <li>
        <span class="key-swatch key-hatched" /> will look dim
      </li>
      <li>
        <span class="key-swatch key-open" /> dark
      </li>
      <li>
        <span class="key-knot" /> next round
      </li>
    </ul>
  );
}

/** One prop in a list: what it is, how its wick stands, and by when. */
export function PropRow({ prop, tonight, nextRound, withSign = false, saidAbove = null }: PropRowProps) {
  const isKnown = prop.group !== 'unknown';
  // Beside its sign, a note says more only where something is to be done or found out.
  const isNoted = prop.note !== saidAbove && (!withSign || prop.group === 'at-risk' || !isKnown);
  return (
    <li class="row">
      <Link path={`/props/${prop.propId}`} class="row-link">
        <span class="row-name-line">
          <span class="tag">{prop.tag}</span>
          <span class="row-title">{prop.name}</span>
          {prop.importance === 'must-not-fail' && (
            <span class="badge">{IMPORTANCE_WORDS[prop.importance]}</span>
          )}
        </span>
        <span class="row-wick">
          {wick(wickOfProp(prop, { tonight, nextRound }), { width: 180, label: wickWords(prop, tonight) })}
        </span>
        <span class="row-when">
          {withSign && (
            <span class="row-group">
              {sign(prop.group)}
              <span class="row-group-word">{GROUP_WORDS[prop.group].short}</span>
            </span>
          )}
          {isKnown && <span class="row-dim">{dimWords(prop.dim, tonight)}</span>}
          {prop.swapBy !== null && <span class="row-swap">{swapByWords(prop.swapBy, tonight)}</span>}
          {prop.lastSeen && prop.lastSeen !== 'bright' && (
            <span class="row-seen">last seen {prop.lastSeen}</span>
          )}
        </span>
        {prop.note && isNoted && <span class="row-note">{prop.note}</span>}
      </Link>
    </li>
  );
}
