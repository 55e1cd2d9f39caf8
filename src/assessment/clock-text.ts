/** Time of day as hh:mm or hh:mm:ss, past midnight counted on from 00:00. */
export function clockText(secondsOfDay: number, to: 'minutes' | 'seconds' = 'minutes'): string {
  const seconds = Math.floor(secondsOfDay);
  const two = (value: number): string => String(value).padStart(2, '0');
  const clock = `${two(Math.floor(seconds / 3600) % 24)}:${two(Math.floor(seconds / 60) % 60)}`;
  return to === 'minutes' ? clock : `${clock}:${two(seconds % 60)}`;
}
