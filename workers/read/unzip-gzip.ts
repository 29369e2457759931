import { Gunzip } from 'fflate';
import { Unreadable } from './raw-table.ts';

/** The bytes of a gzip file of one or more members (RFC 1952); anything else as it is. */
export function unzipIfGzip(bytes: Uint8Array, fileName: string): Uint8Array {
  if (bytes[0] !== 0x1f || bytes[1] !== 0x8b) return bytes;
  const chunks: Uint8Array[] = [];
  const gunzip = new Gunzip((chunk) => chunks.push(chunk));
  try {
    gunzip.push(bytes, true);
  } catch (cause) {
    // Zeros after the last member are refused only when everything has been delivered.
    if (chunks.length === 0)
      throw new Unreadable(`${fileName} was not read. It begins like a gzip file but cannot be unpacked: ${cause}.`);
  }
  const total = chunks.reduce((sum, { length }) => sum + length, 0);
  const whole = new Uint8Array(total);
  let at = 0;
  for (const chunk of chunks) {
    whole.set(chunk, at);
    at += chunk.length;
  }
  return whole;
}
