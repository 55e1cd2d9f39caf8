/** A time inside a sentence, rounded down: what is left is never told longer than it is. */
export function durationWords(seconds: number): string {
  const whole = Math.floor(seconds + 1e-6);
  if (whole < 120) return `${String(whole)} s`;
  const minutes = Math.floor(whole / 60);
  if (minutes < 120) return `${String(minutes)} min`;
  return `${String(Math.floor(minutes / 60))} h`;
}
