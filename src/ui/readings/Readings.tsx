// Owns the place of the readings: what is read, the curve, the trace and the spot table side by side.
// Must not know how runs are made or how curves are drawn.
import { useMemo, useState } from 'react';
import { useShallow } from 'zustand/react/shallow';
import { componentsOf } from '../../app/field-choice.ts';
import { useJobStore } from '../../app/job-store.ts';
import { CURRENT_LINE, lineStyleOfKept } from '../../app/line-styles.ts';
import { useRunStore } from '../../app/run-store.ts';
import { componentNames, type CurveChoice, type DrawnRun, type Quantity } from './curve-data.ts';
import { SpectrumPlot } from './SpectrumPlot.tsx';
import { SpotTable } from './SpotTable.tsx';
import { TracePlot } from './TracePlot.tsx';
import { describeState } from './state-words.ts';
import './readings.css';

const QUANTITIES: readonly Quantity[] = ['insertion ratio', 'level', 'spectrum'];

/** The wanted one if the section has it; else the electric field that carries the wave. */
function chooseComponent(wanted: string | null, components: readonly string[]): string {
  if (wanted !== null && componentNames(components).includes(wanted)) return wanted;
  return components[0] === 'Ez' ? 'Ez' : '|E|';
}

export function Readings() {
  const job = useJobStore((state) => state.job);
  const { main, reference, kept, answeredJob } = useRunStore(
    useShallow(({ main, reference, kept, answeredJob }) => ({ main, reference, kept, answeredJob })),
  );
  const [quantity, setQuantity] = useState<Quantity>('insertion ratio');
  const [wantedProbe, setProbe] = useState<string | null>(null);
  const [wantedComponent, setComponent] = useState<string | null>(null);
  const [rms, setRms] = useState(false);
  const [logarithmic, setLogarithmic] = useState(false);

  const components = componentsOf((answeredJob ?? job).section);
  const names = componentNames(components);
  const component = chooseComponent(wantedComponent, components);
  const probe = job.probes.find(({ id }) => id === wantedProbe) ?? job.probes[0];
  const probeId = probe?.id ?? '';
  const choice: CurveChoice = { quantity, probeId, component, rms };
  const runs = useMemo((): DrawnRun[] => {
    const current: DrawnRun[] = main === null ? [] : [{ id: 'current', name: 'this run', main, reference, style: CURRENT_LINE }];
    const over = kept.filter((run) => run.overlaid && run.main !== main);
    return [
      ...current,
      ...over.map(({ id, name, main, reference }) => ({ id, name, main, reference, style: lineStyleOfKept(id) })),
    ];
  }, [main, reference, kept]);

  if (probe === undefined) {
    return (
      <section className="readings" aria-label="Readings">
        <p className="readings-empty">Nothing is read yet: place a probe where the field is wanted.</p>
      </section>
    );
  }
  return (
    <section className="readings" aria-label="Readings">
      <div className="readings-bar">
        <fieldset className="group" aria-label="Quantity">
          {QUANTITIES.map((one) => (
            <button key={one} className="plain-button" aria-pressed={one === quantity} onClick={() => setQuantity(one)}>
              {one}
            </button>
          ))}
        </fieldset>
        <label>
          at{' '}
          <select className="quiet-select" value={probe.id} onChange={(event) => setProbe(event.target.value)}>
            {job.probes.map(({ id, name }) => (
              <option key={id} value={id}>
                {name}
              </option>
            ))}
          </select>
        </label>
        <fieldset className="group" aria-label="Component">
          {names.map((name) => (
            <button key={name} className="plain-button" aria-pressed={name === component} onClick={() => setComponent(name)}>
              {name}
            </button>
          ))}
        </fieldset>
        <button className="plain-button" aria-pressed={logarithmic} onClick={() => setLogarithmic(!logarithmic)}>
          log f
        </button>
        {quantity === 'level' ? (
          <button className="plain-button" aria-pressed={rms} onClick={() => setRms(!rms)}>
            RMS
          </button>
        ) : null}
        <ReadingState quantity={quantity} />
      </div>
      <div className="readings-plots">
        <SpectrumPlot runs={runs} choice={choice} probeName={probe.name} logarithmic={logarithmic} />
        <div className="readings-side">
          <TracePlot probeId={probe.id} probeName={probe.name} component={component} />
          <SpotTable runs={runs} choice={choice} />
        </div>
      </div>
    </section>
  );
}

/** Whether the curve can be trusted as it stands, in words next to it. */
function ReadingState({ quantity }: { readonly quantity: Quantity }) {
  const words = useRunStore((state) => describeState(state, quantity));
  return <output className="readings-state">{words}</output>;
}
