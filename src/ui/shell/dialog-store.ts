// Owns which dialog of the shell is open.
// Must not know what the dialogs hold.
import { create } from 'zustand';

export type DialogName = 'commands' | 'cautions' | 'speed';

interface DialogState {
  readonly open: DialogName | null;
  show(name: DialogName): void;
  close(): void;
}

export const useDialogStore = create<DialogState>()((set) => ({
  open: null,
  show: (open) => set({ open }),
  close: () => set({ open: null }),
}));
