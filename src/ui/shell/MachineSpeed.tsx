// Owns the page that measures how fast this machine steps, here in the browser.
// Must not know the job or the run.
import { Dialog } from 'radix-ui';
import { useEffect, useState } from 'react';
import { measureMachine } from '../../app/machine-speed.ts';
import type { Speed } from '../../../workers/measure-speed.ts';
import { durationWords, throughputWords } from '../sheet/run-words.ts';
import { useDialogStore } from './dialog-store.ts';

export function MachineSpeed() {
  const open = useDialogStore((state) => state.open === 'speed');
  const close = useDialogStore((state) => state.close);
  return (
    <Dialog.Root open={open} onOpenChange={(on) => !on && close()}>
      <Dialog.Portal>
        <Dialog.Overlay className="dialog-shade" />
        <Dialog.Content className="page-dialog" aria-describedby={undefined}>
          <Dialog.Title>Speed of this machine</Dialog.Title>
          <p>Square sheets of free space with absorbing edges, one line current and one probe, stepped for half a second each.</p>
          <SpeedTable />
          <Dialog.Close className="main-button">Close</Dialog.Close>
        </Dialog.Content>
      </Dialog.Portal>
    </Dialog.Root>
  );
}

/** Measured when it is opened, given up when it is closed. */
function SpeedTable() {
  const [speeds, setSpeeds] = useState<readonly Speed[]>([]);
  const [words, setWords] = useState('Measuring.');
  useEffect(() => {
    const ending = new AbortController();
    const tell = (speed: Speed): void => setSpeeds((known) => [...known, speed]);
    void measureMachine(tell, ending.signal).then(setWords);
    return () => ending.abort();
  }, []);
  return (
    <>
      <table className="speed-table">
        <thead>
          <tr>
            <th scope="col">cells</th>
            <th scope="col">threads</th>
            <th scope="col">updates</th>
            <th scope="col">a thousand steps take</th>
          </tr>
        </thead>
        <tbody>
          {speeds.map((speed) => (
            <tr key={`${speed.cells} ${speed.threads}`}>
              <th scope="row">
                {speed.cells} × {speed.cells}
              </th>
              <td className="num">{speed.threads}</td>
              <td className="num">{throughputWords(speed.megaCellsPerSecond)}</td>
              <td className="num">{durationWords(speed.cellsTotal / (1000 * speed.megaCellsPerSecond))}</td>
            </tr>
          ))}
        </tbody>
      </table>
      <p>
        <output>{words}</output>
      </p>
    </>
  );
}
