/** ", 18 min left" from the pace so far; empty while there is none. */
export function timeLeftWords(done: number, total: number, elapsedMs: number): string {
  if (done < 2) return '';
  const seconds = (elapsedMs / done / 1000) * (total - done);
  if (seconds < 90) return `, ${Math.max(1, Math.round(seconds))} s left`;
  return `, ${Math.round(seconds / 60)} min left`;
}
