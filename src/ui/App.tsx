// Owns where the four places stand, and the shell around them.
// Must not know what the places hold.
import { lazy, Suspense, useLayoutEffect } from 'react';
import { useViewStore } from '../app/view-store.ts';
import { Brief } from './brief/Brief.tsx';
import { Readings } from './readings/Readings.tsx';
import { RunBook } from './run-book/RunBook.tsx';
import { Header } from './shell/Header.tsx';
import { Notices } from './shell/Notices.tsx';
import type { SplitterSpec } from './shell/Splitter.tsx';
import { Splitter } from './shell/Splitter.tsx';
import { useDrop } from './shell/use-drop.ts';
import { usePartClipboard } from './shell/use-part-clipboard.ts';
import { useExamples } from './shell/use-examples.ts';
import { useMedia } from './shell/use-media.ts';
import { useShortcuts } from './shell/use-shortcuts.ts';
import { RunStrip } from './sheet/RunStrip.tsx';
import { Sheet } from './sheet/Sheet.tsx';
import './shell/shell.css';

/** Fetched with the page, after its first paint: nothing is fetched later. */
const Dialogs = lazy(async () => ({ default: (await import('./shell/Dialogs.tsx')).Dialogs }));

export function App() {
  const theme = useViewStore((state) => state.theme);
  const narrow = useMedia('(max-width: 899px)');
  const examples = useExamples();
  const dropping = useDrop();
  usePartClipboard();
  useShortcuts();
  // Before the paint, so that a dark bench never flashes light.
  useLayoutEffect(() => {
    document.documentElement.dataset['theme'] = theme;
  }, [theme]);
  return (
    <div className="bench" data-narrow={narrow}>
      <Header examples={examples} />
      <div className="places">{narrow ? <NarrowPlaces /> : <WidePlaces />}</div>
      <Suspense fallback={null}>
        <Dialogs examples={examples} />
      </Suspense>
      <Notices />
      {dropping ? <div className="drop-hint">Drop a job file to open it</div> : null}
    </div>
  );
}

function SheetPlace() {
  return (
    <section className="sheet-place" aria-label="Sheet and run">
      <Sheet />
      <RunStrip />
    </section>
  );
}

const BRIEF_WIDTH: SplitterSpec = {
  property: '--brief-width',
  label: 'Width of the Brief',
  direction: 'left and right',
  grows: 'with',
  initial: 344,
  least: 240,
  most: 640,
};
const READINGS_HEIGHT: SplitterSpec = {
  property: '--readings-height',
  label: 'Height of the readings',
  direction: 'up and down',
  grows: 'against',
  initial: 304,
  least: 110,
  most: 720,
};
const RUN_BOOK_WIDTH: SplitterSpec = {
  property: '--run-book-width',
  label: 'Width of the run book',
  direction: 'left and right',
  grows: 'against',
  initial: 232,
  least: 150,
  most: 480,
};

function WidePlaces() {
  return (
    <div className="places-wide">
      <Brief />
      <main className="places-main">
        <Splitter spec={BRIEF_WIDTH} />
        <div className="places-right">
          <SheetPlace />
          <Splitter spec={READINGS_HEIGHT} />
          <div className="places-lower">
            <Readings />
            <Splitter spec={RUN_BOOK_WIDTH} />
            <RunBook />
          </div>
        </div>
      </main>
    </div>
  );
}

/** One under the other; the page scrolls. */
function NarrowPlaces() {
  return (
    <div className="places-stacked">
      <details className="stacked-brief" open>
        <summary className="heading">Brief</summary>
        <Brief />
      </details>
      <main>
        <SheetPlace />
        <Readings />
        <RunBook />
      </main>
    </div>
  );
}
