/** Seconds after midnight of a clock text; hours past 24 are the small hours of the next day. */
export function dayTimeSeconds(text: string): number | undefined {
  const match = /^(\d{1,2}):([0-5]\d)$/.exec(text);
  if (!match) return undefined;
  const [, hours = '', minutes = ''] = match;
  const seconds = Number(hours) * 3600 + Number(minutes) * 60;
  return seconds <= 172_800 ? seconds : undefined;
}

/** The clock text of seconds after midnight, to the minute. */
export function dayTimeText(seconds: number): string {
  const minutes = Math.round(seconds / 60);
  const two = (value: number) => String(value).padStart(2, '0');
  return `${two(Math.floor(minutes / 60))}:${two(minutes % 60)}`;
}
