import { transfer } from 'comlink';

/** Hands the buffers of every typed array in a result over instead of copying them. The result is then spent. */
export function transferArrays<T extends object>(result: T): T {
  const buffers = new Set<ArrayBuffer>();
  collectBuffers(result, buffers);
  return transfer(result, [...buffers]);
}

function collectBuffers(value: unknown, into: Set<ArrayBuffer>): void {
  if (value === null || typeof value !== 'object') return;
  if (ArrayBuffer.isView(value)) {
    if (value.buffer instanceof ArrayBuffer) into.add(value.buffer);
    return;
  }
  for (const member of Object.values(value)) collectBuffers(member, into);
}
