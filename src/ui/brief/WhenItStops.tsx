// Owns the sentence on when a run ends.
// Must not know how the end is judged.
import { useJobStore } from '../../app/job-store.ts';
import { SaidHere } from './SaidHere.tsx';
import { QuantityValue } from './values.tsx';

export function WhenItStops() {
  const stop = useJobStore((state) => state.job.stop);
  const never = stop.decay.trim() === 'never';
  return (
    <section aria-labelledby="brief-stop">
      <h2 className="heading" id="brief-stop">
        When it stops
      </h2>
      <p>
        {never ? 'The decay of the energy stops it ' : 'When the energy has fallen by '}
        <QuantityValue path={['stop', 'decay']} text={stop.decay} label='Fall of the energy, or "never"' dimension="decibel" />
        {never ? '; it ends after ' : ', or after '}
        <QuantityValue path={['stop', 'after']} text={stop.after} label="Longest time simulated" dimension="time" />.
      </p>
      <SaidHere place="stop" />
    </section>
  );
}
