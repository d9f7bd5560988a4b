// Owns what the program tells the person in passing: notices with their errors and a way back.
// Must not know React components, or how notices look.
import { create } from 'zustand';
import type { AppError } from '../base/result.ts';

export interface Notice {
  readonly id: number;
  readonly kind: 'done' | 'trouble';
  readonly title: string;
  /** What is wrong, where, and the mend: shown as a list. */
  readonly errors: readonly AppError[];
  /** The way back or on ("Undo"). */
  readonly action: { readonly label: string; run(): void } | null;
}

interface NoticeState {
  readonly notices: readonly Notice[];
  dismiss(id: number): void;
}

export const useNoticeStore = create<NoticeState>()((set) => ({
  notices: [],
  dismiss: (id) => set((state) => ({ notices: state.notices.filter((notice) => notice.id !== id) })),
}));

/** Notices kept at once: older ones make room. */
const MOST_NOTICES = 4;
let lastId = 0;

function notify(notice: Omit<Notice, 'id'>): void {
  lastId += 1;
  const added = { id: lastId, ...notice };
  useNoticeStore.setState((state) => ({ notices: [...state.notices, added].slice(-MOST_NOTICES) }));
}

export function tell(title: string, action: Notice['action'] = null): void {
  notify({ kind: 'done', title, errors: [], action });
}

export function tellTrouble(title: string, errors: readonly AppError[] = []): void {
  notify({ kind: 'trouble', title, errors, action: null });
}
