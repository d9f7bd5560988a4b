// Owns the list of everything the bench can be told to do, in our words and in those a person may search for.
// Must not know how the list is shown.
import type { Example } from '../../app/examples.ts';
import {
  exportSheetPicture,
  exportSpectrum,
  exportTimeSeries,
  openExample,
  openJobFile,
  saveJobFile,
  startNewJob,
} from '../../app/files.ts';
import { componentsOf } from '../../app/field-choice.ts';
import { useJobStore } from '../../app/job-store.ts';
import { runActions } from '../../app/run-actions.ts';
import { useRunStore } from '../../app/run-store.ts';
import { useViewStore } from '../../app/view-store.ts';
import type { PartKind } from '../../model/job.ts';
import { addDrive, addProbe, removeSelected, duplicateSelected } from '../brief/additions.ts';
import { useDialogStore } from './dialog-store.ts';

export interface BenchCommand {
  readonly group: 'Run' | 'Job' | 'Draw' | 'Look' | 'Help';
  readonly label: string;
  /** Other words for it. */
  readonly also: readonly string[];
  readonly keys?: string;
  run(): void;
}

const PART_WORDS: Readonly<Record<PartKind, readonly string[]>> = {
  wall: ['line', 'sheet metal', 'screen', 'barrier', 'polyline'],
  rectangle: ['box', 'block', 'slab', 'slot', 'square'],
  disc: ['circle', 'cylinder', 'post', 'rod', 'hole'],
  ring: ['arc', 'bend', 'tube', 'annulus', 'sector'],
  polygon: ['shape', 'outline', 'triangle'],
  stroke: ['paint', 'brush', 'freehand', 'erase', 'pencil'],
};

function runCommands(): readonly BenchCommand[] {
  const { progress, main } = useRunStore.getState();
  const going = progress.state === 'running';
  return [
    { group: 'Run', label: 'Run', also: ['start', 'solve', 'simulate', 'compute', 'go'], run: () => void runActions.run() },
    going
      ? { group: 'Run', label: 'Hold', also: ['pause', 'wait'], run: () => void runActions.hold() }
      : { group: 'Run', label: 'Go on', also: ['resume', 'continue'], run: () => void runActions.resume() },
    { group: 'Run', label: 'One step', also: ['single step', 'advance'], run: () => void runActions.stepOnce() },
    { group: 'Run', label: 'Back to t = 0', also: ['rewind', 'reset', 'restart'], run: () => void runActions.backToStart() },
    { group: 'Run', label: 'Stop with what there is', also: ['end', 'abort', 'cancel'], run: () => void runActions.stop() },
    ...(main === null
      ? []
      : [
          {
            group: 'Run',
            label: 'Keep this run in the run book',
            also: ['store', 'save result', 'compare', 'pin'],
            run: () => runActions.keep(),
          } as const,
        ]),
  ];
}

function jobCommands(examples: readonly Example[]): readonly BenchCommand[] {
  const { undo, redo, undoLabel, redoLabel } = useJobStore.getState();
  return [
    { group: 'Job', label: `Undo${undoLabel === null ? '' : `: ${undoLabel}`}`, also: ['back'], keys: 'Ctrl Z', run: undo },
    {
      group: 'Job',
      label: `Redo${redoLabel === null ? '' : `: ${redoLabel}`}`,
      also: ['again', 'forward'],
      keys: 'Ctrl Shift Z',
      run: redo,
    },
    { group: 'Job', label: 'Open a job file', also: ['load', 'import'], keys: 'Ctrl O', run: () => void openJobFile() },
    { group: 'Job', label: 'Save the job as a file', also: ['download', 'write'], keys: 'Ctrl S', run: () => void saveJobFile() },
    { group: 'Job', label: 'Begin an empty job', also: ['new', 'clear', 'blank'], run: startNewJob },
    { group: 'Job', label: 'Export time series (CSV)', also: ['download', 'trace', 'samples'], run: exportTimeSeries },
    {
      group: 'Job',
      label: 'Export spectrum (CSV)',
      also: ['download', 'insertion ratio', 'shielding effectiveness', 'frequency'],
      run: () => void exportSpectrum(),
    },
    {
      group: 'Job',
      label: 'Export the sheet (PNG)',
      also: ['download', 'picture', 'image', 'screenshot'],
      run: () => void exportSheetPicture(),
    },
    ...examples.map((example): BenchCommand => ({
      group: 'Job',
      label: `Example: ${example.title}`,
      also: ['sample', 'demo', example.lookAt],
      run: () => void openExample(example),
    })),
  ];
}

function drawCommands(): readonly BenchCommand[] {
  const { setTool, selection } = useViewStore.getState();
  const draw = (part: PartKind): BenchCommand => ({
    group: 'Draw',
    label: `Draw a ${part}`,
    also: ['add', 'part', ...PART_WORDS[part]],
    run: () => setTool({ kind: 'draw', part }),
  });
  return [
    ...(['wall', 'rectangle', 'disc', 'ring', 'polygon', 'stroke'] as const).map(draw),
    {
      group: 'Draw',
      label: 'Add a plane wave',
      also: ['drive', 'source', 'excitation', 'incident field'],
      run: () => addDrive('plane wave'),
    },
    {
      group: 'Draw',
      label: 'Place a line current',
      also: ['drive', 'source', 'excitation', 'dipole', 'antenna', 'magnetic current'],
      run: () => setTool({ kind: 'place', thing: 'line current' }),
    },
    {
      group: 'Draw',
      label: 'Place a probe',
      also: ['add', 'sensor', 'monitor', 'receiver', 'reading point'],
      run: () => setTool({ kind: 'place', thing: 'probe' }),
    },
    { group: 'Draw', label: 'Add a probe in the middle of the sheet', also: ['sensor', 'monitor'], run: addProbe },
    { group: 'Draw', label: 'Select', also: ['pointer', 'arrow', 'move'], run: () => setTool({ kind: 'select' }) },
    ...(selection.length === 0
      ? []
      : [
          { group: 'Draw', label: 'Duplicate what is selected', also: ['copy', 'clone'], run: duplicateSelected } as const,
          { group: 'Draw', label: 'Remove what is selected', also: ['delete', 'erase'], run: removeSelected } as const,
        ]),
  ];
}

function lookCommands(): readonly BenchCommand[] {
  const { theme, setTheme, setField, setFieldPlace } = useViewStore.getState();
  const views = [...componentsOf(useJobStore.getState().job.section), '|E|', '|H|'] as const;
  const places = { under: 'under the drawing', over: 'over the drawing', off: 'not at all' } as const;
  return [
    ...views.map((view): BenchCommand => ({
      group: 'Look',
      label: `Show ${view.startsWith('|') ? `${view} in dB` : view}`,
      also: ['field', 'component', 'map'],
      run: () => setField(view),
    })),
    ...(['under', 'over', 'off'] as const).map((place): BenchCommand => ({
      group: 'Look',
      label: `Show the field ${places[place]}`,
      also: ['hide', 'layer'],
      run: () => setFieldPlace(place),
    })),
    {
      group: 'Look',
      label: theme === 'light' ? 'Turn to dark' : 'Turn to light',
      also: ['theme', 'mode', 'night', 'colours'],
      run: () => setTheme(theme === 'light' ? 'dark' : 'light'),
    },
    {
      group: 'Help',
      label: 'Speed of this machine',
      also: ['benchmark', 'throughput', 'threads', 'fast', 'slow'],
      run: () => useDialogStore.getState().show('speed'),
    },
    {
      group: 'Help',
      label: 'Limits and cautions',
      also: ['about', 'safety', 'validity', 'help', 'disclaimer'],
      run: () => useDialogStore.getState().show('cautions'),
    },
  ];
}

/** As things stand now: made when the finder opens. */
export function listCommands(examples: readonly Example[]): readonly BenchCommand[] {
  return [...runCommands(), ...drawCommands(), ...lookCommands(), ...jobCommands(examples)];
}
