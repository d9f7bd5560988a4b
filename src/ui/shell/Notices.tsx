// Owns the notices in the corner: what was done, what went wrong and how to mend it.
// Must not know who tells them.
import { useEffect } from 'react';
import type { Notice } from '../../app/notice-store.ts';
import { useNoticeStore } from '../../app/notice-store.ts';

/** Long enough to read a line and reach for the way back; troubles stay until they are closed. */
const DONE_MILLISECONDS = 8000;

export function Notices() {
  const notices = useNoticeStore((state) => state.notices);
  return (
    <section className="notices" aria-label="Notices">
      {notices.map((notice) => (
        <NoticeCard key={notice.id} notice={notice} />
      ))}
    </section>
  );
}

function NoticeCard({ notice }: { readonly notice: Notice }) {
  const dismiss = useNoticeStore((state) => state.dismiss);
  const { id, kind, title, errors, action } = notice;
  useEffect(() => {
    if (kind === 'trouble') return undefined;
    const timer = setTimeout(() => dismiss(id), DONE_MILLISECONDS);
    return () => clearTimeout(timer);
  }, [dismiss, id, kind]);
  return (
    <div className="notice" data-kind={kind} role={kind === 'trouble' ? 'alert' : 'status'}>
      <div className="notice-line">
        <span>{title}</span>
        {action === null ? null : (
          <button
            type="button"
            className="text-button"
            onClick={() => {
              action.run();
              dismiss(id);
            }}
          >
            {action.label}
          </button>
        )}
        <button type="button" className="quiet-button" aria-label="Close this notice" onClick={() => dismiss(id)}>
          ×
        </button>
      </div>
      {errors.length === 0 ? null : (
        <ul>
          {errors.map((error) => (
            <li key={`${error.path ?? ''} ${error.message}`}>
              {error.path === undefined ? null : <code>{error.path}</code>} {error.message}{' '}
              {error.hint === undefined ? null : <span className="soft">{error.hint}</span>}
            </li>
          ))}
        </ul>
      )}
    </div>
  );
}
