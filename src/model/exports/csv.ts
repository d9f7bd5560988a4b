// Owns the form of the program's CSV files: RFC 4180, decimal points, header lines, names that no spreadsheet runs.
// Must not know what the columns mean.

const LINE_BREAK = '\r\n';

/** Digits below which a single-precision number never needs fewer, and above which it never needs more. */
const FEWEST_DIGITS = 6;
const MOST_DIGITS = 9;

/** Shortest decimal that reads back as the same single-precision number; empty when it is not finite. */
export function writeSingle(value: number): string {
  if (!Number.isFinite(value)) return '';
  const single = Math.fround(value);
  for (let digits = FEWEST_DIGITS; digits < MOST_DIGITS; digits += 1) {
    const short = Number(single.toPrecision(digits));
    if (Math.fround(short) === single) return writeDouble(short);
  }
  return writeDouble(Number(single.toPrecision(MOST_DIGITS)));
}

/** Shortest decimal that reads back as the same number (ECMAScript's own); empty when it is not finite. */
export function writeDouble(value: number): string {
  // Minus zero is written as zero: the sign of nothing only puzzles.
  return Number.isFinite(value) ? String(value === 0 ? 0 : value) : '';
}

/** What separates cells in one locale or another, and line breaks. */
const SEPARATORS = /[\p{Cc}\u2028\u2029;]+/gu;

/** A name as a cell: never taken for a formula, quoted where it must be. */
export function writeName(name: string): string {
  const plain = name.replaceAll(SEPARATORS, ' ').trim();
  const safe = /^[=+\-@]/.test(plain) ? `'${plain}` : plain;
  return /[",]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}

/** A line of the head, "# key: text". It holds no separator, so that every reader sees a single cell. */
export function writeHeadLine(key: string, text: string): string {
  return `# ${key}: ${text.replaceAll(SEPARATORS, ' ').replaceAll(',', ' ').replaceAll('"', "'").trim()}`;
}

export function joinRows(rows: readonly string[]): string {
  return rows.join(LINE_BREAK) + LINE_BREAK;
}
