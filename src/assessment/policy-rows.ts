import { NotFound } from '../errors.js';
import type { Policy, PolicyDefaultName } from './catalogue-types.js';
import type { Fallback } from './plan-reader.js';

/** The default row of the policy by its name. */
export function policyDefault(policy: Policy, name: PolicyDefaultName): Fallback {
  const row = policy.defaults.find((candidate) => candidate.name === name);
  if (!row) {
    throw new NotFound(
      `The policy has no default named ${name}.`,
      'Add the row, with its source, to the policy file.',
    );
  }
  return {
    value: row.value,
    low: row.low ?? row.value,
    high: row.high ?? row.value,
    source: row.source,
    why: row.title,
  };
}

/** Air changes per hour with fans off for a kind of room; the most cautious row for an unnamed one. */
export function infiltrationFallback(policy: Policy, kind: string | null): Fallback {
  const named = policy.roomTypes.find((candidate) => candidate.id === kind);
  if (named) {
    return {
      value: named.infiltrationPerHour.typical,
      low: named.infiltrationPerHour.low,
      high: named.infiltrationPerHour.high,
      source: named.source,
      why: `fans off, ${named.title}`,
    };
  }
  return {
    value: 0,
    low: 0,
    high: Math.max(...policy.roomTypes.map((row) => row.infiltrationPerHour.high)),
    source: 'policy',
    why: 'fans off, kind of room not stated: no air change is credited',
  };
}

/** Carbon dioxide breathed out per person [m3/s at the reference state] by age group. */
export function breathRow(
  policy: Policy,
  ageGroup: 'toddler' | 'child' | 'teenager' | 'adult',
  activity: 'seated' | 'excited' | 'working',
): Fallback {
  const ofAge = policy.carbonDioxidePerPerson.filter((row) => row.ageGroup === ageGroup);
  const row =
    ofAge.find((candidate) => candidate.activity === activity) ??
    ofAge[0] ??
    policy.carbonDioxidePerPerson.find((candidate) => candidate.ageGroup === 'adult');
  if (!row) {
    throw new NotFound(
      'The policy has no breath row for adults.',
      'Add carbonDioxidePerPerson rows to the policy file.',
    );
  }
  const { low, typical, high } = row.m3PerS;
  return { value: typical, low, high, source: row.source, why: row.title };
}
