import type { ErrorDetail } from '../../errors.js';
import type { AirGasTable } from './air-gases.js';
import type { AirInput, AirOpening, AirRelease, AirSpace, Timed } from './air-input.js';
import { airPathProblems } from './air-path-problems.js';
import { volumeCurve } from './volume-curve.js';

/** Measured volume against the shape: more than this apart is a contradiction [-]. */
const VOLUME_TOLERANCE = 0.15;
const SUM_TOLERANCE = 1e-6;

/** Everything in an input that cannot be meant, each with its place. */
export function airInputProblems(input: AirInput): readonly ErrorDetail[] {
  const ids = new Set(input.spaces.map((space) => space.id));
  const found: ErrorDetail[] = [];
  const note = (path: string, problem: string): void => {
    found.push({ path, problem });
  };
  if (input.spaces.length === 0) note('/spaces', 'holds no space');
  noteTwice(input.spaces, '/spaces', note);
  noteTwice(input.zones ?? [], '/zones', note);
  for (const [i, space] of input.spaces.entries())
    spaceProblems(space, `/spaces/${String(i)}`, note);
  const mustBeSpace = (id: string, path: string): void => {
    if (!ids.has(id)) note(path, `names no space of this input: ${id}`);
  };
  for (const [i, opening] of (input.openings ?? []).entries()) {
    const path = `/openings/${String(i)}`;
    for (const side of ['from', 'to'] as const) {
      if (opening[side] !== 'outside') mustBeSpace(opening[side], `${path}/${side}`);
    }
    if (opening.from === opening.to) note(`${path}/to`, 'joins a space to itself');
    openingProblems(opening, input.spaces, path, note);
  }
  noteOverlaps(input.openings ?? [], '/openings', note);
  noteOverlaps(input.airSystems ?? [], '/airSystems', note);
  for (const [i, system] of (input.airSystems ?? []).entries()) {
    const path = `/airSystems/${String(i)}`;
    if (system.space !== undefined) mustBeSpace(system.space, `${path}/space`);
    if ((system.space === undefined) === (system.serves === undefined)) {
      note(path, 'needs either space or serves');
    }
    let sum = 0;
    for (const [j, served] of (system.serves ?? []).entries()) {
      mustBeSpace(served.space, `${path}/serves/${String(j)}/space`);
      sum += served.share;
    }
    if (system.serves && Math.abs(sum - 1) > SUM_TOLERANCE) {
      note(`${path}/serves`, `shares add up to ${String(sum)}, not 1`);
    }
    const balanced = system.supplyM3PerS !== undefined || system.extractM3PerS !== undefined;
    if (system.drive === 'balanced' ? !balanced && system.freshAirM3PerS === undefined : balanced) {
      note(
        path,
        system.drive === 'balanced'
          ? 'a balanced system needs supplyM3PerS and extractM3PerS'
          : `supplyM3PerS and extractM3PerS belong to a balanced system, not to ${system.drive}`,
      );
    }
  }
  for (const [i, one] of (input.infiltration ?? []).entries()) {
    mustBeSpace(one.space, `/infiltration/${String(i)}/space`);
    const overlap = (input.infiltration ?? [])
      .slice(0, i)
      .some((other) => other.space === one.space && isAtTheSameTime(other, one));
    if (overlap) note(`/infiltration/${String(i)}`, 'overlaps another entry for the same space');
  }
  for (const [i, one] of (input.transfers ?? []).entries()) {
    for (const side of ['from', 'to'] as const) {
      if (one[side] !== 'outside') mustBeSpace(one[side], `/transfers/${String(i)}/${side}`);
    }
  }
  for (const [i, one] of (input.occupants ?? []).entries()) {
    mustBeSpace(one.space, `/occupants/${String(i)}/space`);
  }
  for (const [i, one] of (input.zones ?? []).entries()) {
    mustBeSpace(one.space, `/zones/${String(i)}/space`);
    const space = input.spaces.find((candidate) => candidate.id === one.space);
    if (!space) continue;
    const mouth = (one.floorLevelM ?? lowestFloor(space)) + one.heightM;
    const pockets = (space.pockets ?? []).filter((pocket) => pocket.at === 'high');
    const top = lowestFloor(space) + space.heightM + Math.max(0, ...pockets.map((p) => p.depthM));
    if (mouth > top + 1e-9) note(`/zones/${String(i)}/heightM`, 'lies above the ceiling');
  }
  for (const [i, one] of (input.releases ?? []).entries()) {
    const path = `/releases/${String(i)}`;
    mustBeSpace(one.space, `${path}/space`);
    releaseProblems(one, path, note);
  }
  found.push(...airPathProblems(input));
  const timed = ['openings', 'airSystems', 'infiltration', 'transfers', 'occupants'] as const;
  for (const list of timed) {
    for (const [i, one] of (input[list] ?? []).entries()) {
      if (one.toS !== undefined && one.toS <= (one.fromS ?? 0)) {
        note(`/${list}/${String(i)}/toS`, 'is not after fromS');
      }
    }
  }
  return found;
}

type Note = (path: string, problem: string) => void;

const isAtTheSameTime = (one: Timed, other: Timed): boolean =>
  (one.fromS ?? 0) < (other.toS ?? Infinity) && (other.fromS ?? 0) < (one.toS ?? Infinity);

/** Rows of one id are the times of one thing: it cannot be in two states at once. */
function noteOverlaps(
  list: readonly (Timed & { readonly id?: string })[],
  path: string,
  note: Note,
): void {
  for (const [i, one] of list.entries()) {
    const before = list
      .slice(0, i)
      .find((other) => one.id !== undefined && other.id === one.id && isAtTheSameTime(other, one));
    if (!before) continue;
    note(
      `${path}/${String(i)}`,
      `overlaps another time of ${one.id ?? ''}: end the one before the other begins`,
    );
  }
}

function openingProblems(
  opening: AirOpening,
  spaces: readonly AirSpace[],
  path: string,
  note: Note,
): void {
  const sides = [opening.from, opening.to].flatMap((side) => {
    const space = spaces.find((one) => one.id === side);
    return space ? [space] : [];
  });
  if (opening.kind === 'floorOpening') {
    for (const { id, floorAreaM2 } of sides) {
      if (opening.widthM * opening.heightM > 1.01 * floorAreaM2) {
        note(`${path}/widthM`, `is larger than the floor of ${id}; give the clear hole`);
      }
    }
    return;
  }
  // Where no sill is given it is the floor of the side named first in the list of spaces.
  const first = spaces.find((one) => one.id === opening.from || one.id === opening.to);
  const sillM = opening.sillLevelM ?? (first ? lowestFloor(first) : 0);
  for (const space of sides) {
    if (sillM + opening.heightM <= lowestFloor(space) + space.heightM + 0.05) continue;
    note(
      `${path}/${opening.sillLevelM === undefined ? 'heightM' : 'sillLevelM'}`,
      `reaches above the ceiling of ${space.id}; levels are from the datum of the venue`,
    );
  }
}

function noteTwice(list: readonly { readonly id: string }[], path: string, note: Note): void {
  const seen = new Set<string>();
  for (const [i, { id }] of list.entries()) {
    if (seen.has(id)) note(`${path}/${String(i)}/id`, `is used twice: ${id}`);
    seen.add(id);
    if (id === 'outside' && path === '/spaces') {
      note(`${path}/${String(i)}/id`, 'outside is the name of the open air');
    }
  }
}

function lowestFloor(space: AirSpace): number {
  const levels = (space.steps ?? []).map((step) => step.levelM);
  return levels.length > 0 ? Math.min(...levels) : (space.floorLevelM ?? 0);
}

function spaceProblems(space: AirSpace, path: string, note: Note): void {
  if (!(space.floorAreaM2 > 0)) {
    note(`${path}/floorAreaM2`, 'must be above 0');
    return;
  }
  if (!(space.heightM > 0)) {
    note(`${path}/heightM`, 'must be above 0');
    return;
  }
  if ((space.floorRiseM ?? 0) >= space.heightM) {
    note(`${path}/floorRiseM`, 'reaches the ceiling');
    return;
  }
  const steps = space.steps ?? [];
  if (steps.length > 0) {
    const area = steps.reduce((sum, step) => sum + step.areaM2, 0);
    if (Math.abs(area / space.floorAreaM2 - 1) > 0.01) {
      note(`${path}/steps`, `areas add up to ${String(area)} m2, not to floorAreaM2`);
    }
    if (space.floorRiseM !== undefined) note(`${path}/floorRiseM`, 'cannot stand beside steps');
    if (
      space.floorLevelM !== undefined &&
      Math.abs(space.floorLevelM - lowestFloor(space)) > 0.01
    ) {
      note(`${path}/floorLevelM`, 'is not the level of the lowest step');
    }
    if (steps.some((step) => step.levelM - lowestFloor(space) >= space.heightM)) {
      note(`${path}/steps`, 'a step reaches the ceiling');
    }
  }
  if (space.volumeM3 !== undefined) {
    const shape = volumeCurve({ ...space, volumeM3: 1 });
    const gross = 1 / shape.freeShare;
    if (Math.abs(space.volumeM3 / gross - 1) > VOLUME_TOLERANCE) {
      note(
        `${path}/volumeM3`,
        `is more than 15 % away from the shape (${String(Number(gross.toPrecision(6)))} m3)`,
      );
    }
  }
  const named = Object.entries(space.initial ?? {});
  const sum = named.reduce((total, [gas, value]) => (gas === 'air' ? total : total + value), 0);
  if (sum > 1 + SUM_TOLERANCE) note(`${path}/initial`, 'fractions add up to more than 1');
}

function releaseProblems(release: AirRelease, path: string, note: Note): void {
  const amounts = [release.amountMol, release.massKg, release.volumeM3].filter(
    (one) => one !== undefined,
  );
  if (amounts.length !== 1) note(path, 'needs exactly one of amountMol, massKg, volumeM3');
  if ((release.gas === undefined) === (release.composition === undefined)) {
    note(path, 'needs either gas or composition');
  }
  if (release.composition) {
    const sum = Object.values(release.composition).reduce((total, share) => total + share, 0);
    if (Math.abs(sum - 1) > SUM_TOLERANCE) {
      note(`${path}/composition`, `adds up to ${String(sum)}, not 1`);
    }
  }
  if (release.profile === 'decaying' && !((release.timeConstantS ?? 0) > 0)) {
    note(`${path}/timeConstantS`, 'is needed above 0 for a decaying release');
  }
}

/** Gas ids that the gas data do not have. */
export function airGasProblems(input: AirInput, gases: AirGasTable): readonly ErrorDetail[] {
  const found: ErrorDetail[] = [];
  const check = (gas: string, path: string): void => {
    if (gas !== 'air' && gases[gas] === undefined) {
      found.push({ path, problem: `is no gas of the data: ${gas}` });
    }
  };
  for (const [i, release] of (input.releases ?? []).entries()) {
    if (release.gas !== undefined) check(release.gas, `/releases/${String(i)}/gas`);
    for (const gas of Object.keys(release.composition ?? {})) {
      check(gas, `/releases/${String(i)}/composition/${gas}`);
    }
  }
  for (const [i, space] of input.spaces.entries()) {
    for (const gas of Object.keys(space.initial ?? {})) {
      check(gas, `/spaces/${String(i)}/initial/${gas}`);
    }
  }
  for (const [i, { quantity }] of (input.thresholds ?? []).entries()) {
    if (quantity !== 'oxygenFraction') check(quantity, `/thresholds/${String(i)}/quantity`);
  }
  return found;
}
