// Owns the short sample of a line: colour and dash pattern, as the curves draw it.
// Must not know runs.
import type { LineStyle } from '../../app/line-styles.ts';

export function LineSample({ style }: { readonly style: LineStyle }) {
  return (
    <svg className="line-sample" width="30" height="8" viewBox="0 0 30 8" aria-hidden="true">
      <line x1="1" y1="4" x2="29" y2="4" stroke={`var(${style.colour})`} strokeWidth="2" strokeDasharray={style.dash.join(' ')} />
    </svg>
  );
}
