import type { Site } from '../api/types.ts';
import { Frame } from '../parts/frame.tsx';
import { Link } from '../parts/link.tsx';
import { Trouble, Waiting } from '../parts/notice.tsx';
import { PageHead } from '../parts/page-head.tsx';
import type { Route } from '../state/route.ts';
import { useShell } from '../state/shell.tsx';
import { NewSitePage } from './new-site-page.tsx';
import { ChangePropPage, NewPropPage } from './prop-form-page.tsx';
import { PropPage } from './prop-page.tsx';
import { PropsPage } from './props-page.tsx';
import { SitePage } from './site-page.tsx';
import { TonightPage } from './tonight-page.tsx';

export function Pages() {
  return (
    <Frame>
      <Chosen />
    </Frame>
  );
}

function Chosen() {
  const { place, sites, site, health, problem, reload } = useShell();
  // Before the moment is known nothing can be told from tonight.
  if (!sites || !health) {
    if (!problem) return <Waiting what="your sites" />;
    return (
      <>
        <PageHead title="No answer yet" />
        <Trouble problem={problem} onAgain={() => void reload()} />
      </>
    );
  }
  if (!site || place.route.page === 'new-site') return <NewSitePage isFirst={!site} />;
  return <OfSite route={place.route} site={site} />;
}

/** A page starts afresh for another site or prop: nothing of the one shows under the name of the other. */
function OfSite({ route, site }: { route: Route; site: Site }) {
  switch (route.page) {
    case 'tonight':
      return <TonightPage key={site.id} site={site} />;
    case 'props':
      return <PropsPage key={site.id} site={site} />;
    case 'new-prop':
      return <NewPropPage key={site.id} site={site} />;
    case 'prop':
      return <PropPage key={route.propId} propId={route.propId} />;
    case 'change-prop':
      return <ChangePropPage key={route.propId} propId={route.propId} />;
    case 'site':
      return <SitePage key={site.id} site={site} />;
    default:
      return <Nowhere />;
  }
}

function Nowhere() {
  return (
    <>
      <PageHead title="Nothing here" />
      <p>
        There is no page at this address. <Link path="/">Back to tonight</Link>
      </p>
    </>
  );
}
