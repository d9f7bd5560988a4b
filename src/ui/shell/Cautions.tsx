// Owns the page on what the results are good for, and what they must not be used for.
// Must not know the job or the run.
import { Dialog } from 'radix-ui';
import { useDialogStore } from './dialog-store.ts';

export function Cautions() {
  const open = useDialogStore((state) => state.open === 'cautions');
  const close = useDialogStore((state) => state.close);
  return (
    <Dialog.Root open={open} onOpenChange={(on) => !on && close()}>
      <Dialog.Portal>
        <Dialog.Overlay className="dialog-shade" />
        <Dialog.Content className="page-dialog" aria-describedby={undefined}>
          <Dialog.Title>Limits and cautions</Dialog.Title>
          <h3>What is computed</h3>
          <p>
            A two-dimensional model of an idealised section: everything drawn runs on without end out of the page. Real slots end,
            real enclosures have corners, and cables run out of the plane; none of them is in the answer.
          </p>
          <p>
            Metal is perfect metal: the loss of its skin is left out. A material that varies with frequency is taken at the centre
            of the band. Numbers marked as typical are no substitute for the data sheet of the batch at hand.
          </p>
          <p>
            The insertion ratio is the field at a point over the field at that point in the reference run. It is neither the
            shielding effectiveness of an enclosure nor of a material.
          </p>
          <h3>What decides instead</h3>
          <ul>
            <li>
              <strong>Shielding.</strong> No result here replaces a measured test: IEEE 299 and 299.1 and the local standard
              decide.
            </li>
            <li>
              <strong>Exposure of people.</strong> This is no exposure assessment: the ICNIRP guidelines, IEEE C95.1 and local
              codes decide.
            </li>
            <li>
              <strong>High power.</strong> Work on high-power equipment belongs to licensed practice.
            </li>
          </ul>
          <h3>Conventions</h3>
          <p>
            exp(+jωt) and peak values throughout, SI units. Coordinates are measured from the origin of the sheet, x to the right,
            y up. Spectra are integrals of the record without a window.
          </p>
          <h3>What leaves this machine</h3>
          <p>Nothing. Jobs, runs and readings stay in this browser until you save or export them.</p>
          <Dialog.Close className="main-button">Close</Dialog.Close>
        </Dialog.Content>
      </Dialog.Portal>
    </Dialog.Root>
  );
}
