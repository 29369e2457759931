/**
 * A short key that is equal for equal values whatever the order of their object keys. Results are filed under it,
 * so that a number can never be shown beside inputs that did not make it.
 */
export function stableKey(value: unknown): string {
  const text = canonicalText(value);
  // Two independent 32-bit FNV-1a style passes: 64 bits are enough to tell a sitting's results apart.
  return hash32(text, 0x811c9dc5) + hash32(text, 0x9747b28c);
}

/** JSON with sorted object keys; undefined members are left out, NaN and infinities are spelled out. */
export function canonicalText(value: unknown): string {
  if (typeof value === 'number' && !Number.isFinite(value)) return `"${value}"`;
  if (value === null || typeof value !== 'object') return JSON.stringify(value) ?? 'null';
  if (Array.isArray(value)) return `[${value.map(canonicalText).join(',')}]`;
  const members = Object.entries(value)
    .filter(([, member]) => member !== undefined)
    .sort(([a], [b]) => (a < b ? -1 : 1))
    .map(([name, member]) => `${JSON.stringify(name)}:${canonicalText(member)}`);
  return `{${members.join(',')}}`;
}

function hash32(text: string, seed: number): string {
  let hash = seed;
  for (let i = 0; i < text.length; i += 1) hash = Math.imul(hash ^ text.charCodeAt(i), 0x01000193);
  return (hash >>> 0).toString(16).padStart(8, '0');
}
