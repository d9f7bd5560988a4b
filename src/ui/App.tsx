// Owns where the four places stand, and the shell around them.
// Must not know what the places hold.
import { useEffect } from 'react';
import { Group, Panel, Separator } from 'react-resizable-panels';
import { useViewStore } from '../app/view-store.ts';
import { Brief } from './brief/Brief.tsx';
import { Readings } from './readings/Readings.tsx';
import { RunBook } from './run-book/RunBook.tsx';
import { Cautions } from './shell/Cautions.tsx';
import { CommandFinder } from './shell/CommandFinder.tsx';
import { Header } from './shell/Header.tsx';
import { Notices } from './shell/Notices.tsx';
import { useDrop } from './shell/use-drop.ts';
import { useExamples } from './shell/use-examples.ts';
import { useMedia } from './shell/use-media.ts';
import { useShortcuts } from './shell/use-shortcuts.ts';
import { RunStrip } from './sheet/RunStrip.tsx';
import { Sheet } from './sheet/Sheet.tsx';
import './shell/shell.css';

export function App() {
  const theme = useViewStore((state) => state.theme);
  const narrow = useMedia('(max-width: 899px)');
  const examples = useExamples();
  const dropping = useDrop();
  useShortcuts();
  useEffect(() => {
    document.documentElement.dataset['theme'] = theme;
  }, [theme]);
  return (
    <div className="bench" data-narrow={narrow}>
      <Header examples={examples} />
      <main className="places">{narrow ? <NarrowPlaces /> : <WidePlaces />}</main>
      <CommandFinder examples={examples} />
      <Cautions />
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

function WidePlaces() {
  return (
    <Group orientation="horizontal">
      <Panel id="brief" defaultSize="344px" minSize="260px" maxSize="46%" groupResizeBehavior="preserve-pixel-size">
        <Brief />
      </Panel>
      <Separator className="splitter" aria-label="Width of the Brief" />
      <Panel id="work" minSize="420px">
        <Group orientation="vertical">
          <Panel id="sheet" minSize="200px">
            <SheetPlace />
          </Panel>
          <Separator className="splitter splitter-flat" aria-label="Height of the readings" />
          <Panel id="readings" defaultSize="34%" minSize="120px">
            <Group orientation="horizontal">
              <Panel id="curves" minSize="300px">
                <Readings />
              </Panel>
              <Separator className="splitter" aria-label="Width of the run book" />
              <Panel id="run-book" defaultSize="232px" minSize="160px" groupResizeBehavior="preserve-pixel-size">
                <RunBook />
              </Panel>
            </Group>
          </Panel>
        </Group>
      </Panel>
    </Group>
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
      <SheetPlace />
      <Readings />
      <RunBook />
    </div>
  );
}
