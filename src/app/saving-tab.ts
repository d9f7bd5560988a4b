// Owns which of several open tabs saves by itself: one at a time, for they share a shelf.
// Must not know what is saved.

const LOCK = 'guidewall saves';
/** A tab that is being reloaded lets go of the lock within this time. */
const PATIENCE_MILLISECONDS = 1000;

/**
 * Resolves when this tab is the one that saves, and says whether another one was. That is told at once by `onOther`; then each
 * call of what `onEdit` is given tries again. So a reload of the other tab does not hand the saving over, but work in this one
 * after the other is closed does.
 */
export async function becomeSavingTab(
  onOther: () => void,
  onEdit: (attempt: () => void) => () => void,
): Promise<{ readonly waited: boolean }> {
  // Without a secure context there are no locks: the last tab to write wins.
  if (navigator.locks === undefined) return { waited: false };
  if (await takeLock({ signal: AbortSignal.timeout(PATIENCE_MILLISECONDS) })) return { waited: false };
  onOther();
  await new Promise<void>((resolve) => {
    const attempt = async (): Promise<void> => {
      if (!(await takeLock({ ifAvailable: true }))) return;
      end();
      resolve();
    };
    const end = onEdit(() => void attempt());
  });
  return { waited: true };
}

/** Once taken it is held until the tab is closed. */
function takeLock(options: LockOptions): Promise<boolean> {
  return new Promise((resolve) => {
    navigator.locks
      .request(LOCK, options, (lock) => {
        resolve(lock !== null);
        return lock === null ? undefined : new Promise(() => undefined);
      })
      .catch(() => resolve(false));
  });
}
