/** A moment as date and time of day, in the time zone of the server. */
export function dateText(moment: Date): string {
  return new Intl.DateTimeFormat('en-GB', { dateStyle: 'medium', timeStyle: 'short' }).format(
    moment,
  );
}
