// Owns the short fingerprint of a plan.
// Must not know what is hashed.

/** FNV-1a over UTF-16 units in two 32-bit lanes with different starts: 16 hexadecimal digits. Not for secrets. */
export function hashText(text: string): string {
  let low = 0x811c9dc5;
  let high = 0x01000193 ^ text.length;
  for (let k = 0; k < text.length; k++) {
    const unit = text.charCodeAt(k);
    low = Math.imul(low ^ unit, 0x01000193);
    high = Math.imul(high ^ (unit + k), 0x85ebca6b);
  }
  const hex = (value: number): string => (value >>> 0).toString(16).padStart(8, '0');
  return hex(high) + hex(low);
}
