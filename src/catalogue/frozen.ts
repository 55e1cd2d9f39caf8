/** The same value, frozen to its last leaf: nobody downstream can change what was checked. */
export function frozen<T>(value: T): T {
  if (typeof value !== 'object' || value === null || Object.isFrozen(value)) return value;
  Object.freeze(value);
  for (const part of Object.values(value)) frozen(part as unknown);
  return value;
}
