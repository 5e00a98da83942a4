import { render } from 'preact';
import { Pages } from './pages/pages.tsx';
import { ShellFrame } from './state/shell.tsx';

render(
  <ShellFrame>
    <Pages />
  </ShellFrame>,
  document.getElementById('page')!,
);
