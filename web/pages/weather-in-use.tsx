import { useState } from 'preact/hooks';
import { api } from '../api/client.ts';
import type { WeatherInUse as InUse, Problem, Site } from '../api/types.ts';
import { Trouble } from '../parts/notice.tsx';
import { counted } from '../words/quantity.ts';

type WeatherInUseProps = { site: Site; inUse: InUse; onRemoved: () => void };

/** What files brought, each with a way to take it out again: a wrong file would else stay for good. */
export function WeatherInUse({ site, inUse, onRemoved }: WeatherInUseProps) {
  const { typicalYear, hours } = inUse;
  const [problem, setProblem] = useState<Problem | null>(null);
  const takeOut = async (of: 'typical-year' | 'hours') => {
    const answer = await api.removeWeather(site.id, of);
    setProblem(answer.ok ? null : answer.problem);
    if (answer.ok) onRemoved();
  };
  return (
    <>
      {(typicalYear || hours) && <p>In use:</p>}
      <ul class="links">
        {typicalYear && (
          <InUseLine
            what={`the typical year of ${typicalYear.stationName}`}
            onTakeOut={() => void takeOut('typical-year')}
          />
        )}
        {hours && (
          <InUseLine
            what={`${counted(hours.count, 'hour')}, ${hours.from} to ${hours.through}`}
            onTakeOut={() => void takeOut('hours')}
          />
        )}
      </ul>
      {problem && <Trouble problem={problem} />}
    </>
  );
}

function InUseLine({ what, onTakeOut }: { what: string; onTakeOut: () => void }) {
  return (
    <li>
      <span>{what}</span>
      <button type="button" class="quiet" onClick={onTakeOut} aria-label={`Take out ${what}`}>
        Take it out
      </button>
    </li>
  );
}
