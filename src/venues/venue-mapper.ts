import type { PlanVenue } from '../assessment/plan-file.js';
import type { StoredVenue, VenueContent, VenueRow } from '../storage/venues.repository.js';

type Keyed = Readonly<Record<string, unknown>>;

const numbered = (letter: string, index: number): string => `${letter}${String(index + 1)}`;

/** A row of the plan file as a row of the database: id and title stand in columns of their own. */
function rowOf(row: Keyed, fallbackKey: string): VenueRow {
  const { id, title, ...data } = row;
  return {
    key: typeof id === 'string' ? id : fallbackKey,
    title: typeof title === 'string' ? title : '',
    data,
  };
}

/** Rows whose plan-file form has no id are keyed by the space they speak of. */
const keyedBy = (rows: readonly Keyed[], letter: string): readonly VenueRow[] =>
  rows.map((row, index) => rowOf(row, numbered(letter, index)));

const titled = ({ title }: VenueRow): { title?: string } => (title === '' ? {} : { title });

/** What the database keeps of a venue. */
export function venueContent(venue: PlanVenue): VenueContent {
  return {
    name: venue.title,
    site: venue.site,
    spaces: keyedBy(venue.spaces, 'S'),
    openings: keyedBy(venue.openings ?? [], 'O'),
    airSystems: keyedBy(venue.airSystems ?? [], 'A'),
    infiltrations: keyedBy(venue.infiltration ?? [], 'I'),
    transfers: keyedBy(venue.transfers ?? [], 'T'),
  };
}

/** The venue as the plan file states it. It was checked against its schema when it was saved. */
export function planVenue(stored: Pick<StoredVenue, keyof VenueContent>): PlanVenue {
  const withId = (rows: readonly VenueRow[]) =>
    rows.map((row) => ({ id: row.key, ...titled(row), ...row.data }));
  const bare = (rows: readonly VenueRow[]) => rows.map((row) => ({ ...row.data }));
  const lists = {
    openings: withId(stored.openings),
    airSystems: withId(stored.airSystems),
    infiltration: bare(stored.infiltrations),
    transfers: bare(stored.transfers),
  };
  const filled = Object.fromEntries(Object.entries(lists).filter(([, rows]) => rows.length > 0));
  return {
    title: stored.name,
    site: stored.site,
    spaces: withId(stored.spaces),
    ...filled,
  } as PlanVenue;
}
