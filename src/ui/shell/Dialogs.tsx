// Owns the dialogs of the shell, in a chunk of their own: none is needed for the first paint.
// Must not know what opens them.
import type { Example } from '../../app/examples.ts';
import { Cautions } from './Cautions.tsx';
import { CommandFinder } from './CommandFinder.tsx';
import { MachineSpeed } from './MachineSpeed.tsx';

export function Dialogs({ examples }: { readonly examples: readonly Example[] }) {
  return (
    <>
      <CommandFinder examples={examples} />
      <Cautions />
      <MachineSpeed />
    </>
  );
}
