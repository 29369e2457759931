/** One animation-frame loop for all plots: however often a plot asks, it is painted once a frame. */
const waiting = new Set<() => void>();
let requested = false;

export function requestPaint(paint: () => void): void {
  waiting.add(paint);
  if (!requested) requestAnimationFrame(runPaints);
  requested = true;
}

export function cancelPaint(paint: () => void): void {
  waiting.delete(paint);
}

function runPaints(): void {
  requested = false;
  const paints = [...waiting];
  waiting.clear();
  for (const paint of paints) paint();
}
