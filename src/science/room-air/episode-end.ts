import type { ReleasePlan } from './release-flow.js';

/** First start and last end of the releases of one episode [s]. */
interface EpisodeSpan {
  readonly name: string;
  readonly firstS: number;
  readonly lastS: number;
}

/** Episodes that the caller named, by first start. */
function namedEpisodes(releases: readonly ReleasePlan[]): readonly EpisodeSpan[] {
  const spans = new Map<string, EpisodeSpan>();
  for (const { episode: name, startS, endS, source } of releases) {
    if (source.episode === undefined && !spans.has(name)) continue;
    const known = spans.get(name);
    spans.set(name, {
      name,
      firstS: Math.min(startS, known?.firstS ?? startS),
      lastS: Math.max(endS, known?.lastS ?? endS),
    });
  }
  return [...spans.values()].sort((a, b) => a.firstS - b.firstS);
}

/** Whether a later episode says that a reading has closed an earlier one. */
function closes(later: EpisodeSpan, earlier: EpisodeSpan): boolean {
  return later.firstS >= earlier.lastS && later.firstS > earlier.firstS;
}

/**
 * Episodes that are over before the run is, by a reading.
 *
 * An episode ends only when a reading meets the hold criterion, never by the clock, and the input
 * has no reading in it. Naming another episode that begins after all of one has been let out is the
 * caller's word that there was one. A release without a name is an episode of its own, as its
 * default says, but nobody has said that a reading closed it: so releases without names count
 * together until the end, and neither close an episode nor are closed by one.
 */
export function closedEpisodes(releases: readonly ReleasePlan[]): ReadonlySet<string> {
  const named = namedEpisodes(releases);
  const last = named.at(-1);
  return new Set(
    named.filter((one) => last !== undefined && closes(last, one)).map((one) => one.name),
  );
}

/**
 * When the gas of each closed episode turns into background, space by space [s].
 *
 * The later episode has to have reached the space too: until then nothing new is bounded there, and
 * counting the old gas on is the cautious side.
 *
 * @param releases releases with the time each reaches each space [s]
 * @param spaces   number of spaces
 * @returns by episode, one time per space; Infinity where it stays open
 */
export function episodeEndsS(
  releases: readonly { readonly plan: ReleasePlan; readonly reachS: Float64Array }[],
  spaces: number,
): ReadonlyMap<string, Float64Array> {
  const plans = releases.map(({ plan }) => plan);
  const closed = closedEpisodes(plans);
  const ends = new Map<string, Float64Array>();
  if (closed.size === 0) return ends;
  const named = namedEpisodes(plans);
  const reached = new Map(
    named.map(({ name }) => [name, new Float64Array(spaces).fill(Infinity)] as const),
  );
  for (const { plan, reachS } of releases) {
    const first = reached.get(plan.episode);
    if (!first) continue;
    for (let i = 0; i < spaces; i++) {
      first[i] = Math.min(first[i] ?? Infinity, reachS[i] ?? Infinity);
    }
  }
  // From the last to the first: the earliest arrival of any episode from there on.
  const later = new Float64Array(spaces).fill(Infinity);
  const earliestFrom = [...named].reverse().map(({ name }) => {
    const arrival = reached.get(name);
    for (let i = 0; i < spaces; i++) {
      later[i] = Math.min(later[i] ?? Infinity, arrival?.[i] ?? Infinity);
    }
    return Float64Array.from(later);
  });
  earliestFrom.reverse();
  for (const one of named) {
    if (!closed.has(one.name)) continue;
    const next = named.findIndex((other) => closes(other, one));
    const from = earliestFrom[next];
    if (from) ends.set(one.name, from);
  }
  return ends;
}
