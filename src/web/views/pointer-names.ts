import type { ErrorDetail } from '../../errors.js';

const amountKeys = /\.(massKg|volumeM3|amountMol)$/;

/**
 * The form field for a place in the plan file: the deepest field that exists on the page, so that
 * every message finds a home.
 */
export function fieldNameAt(pointer: string, names: ReadonlySet<string>): string | undefined {
  const steps = pointer.split('/').slice(1);
  for (let depth = steps.length; depth > 0; depth -= 1) {
    const name = steps.slice(0, depth).join('.');
    if (names.has(name)) return name;
    const amount = name.replace(amountKeys, '.amount');
    if (names.has(amount)) return amount;
  }
  return undefined;
}

/** Problems of a plan file or venue value, moved to the fields of the page that shows it. */
export function problemsOnPage(
  details: readonly ErrorDetail[],
  names: ReadonlySet<string>,
): readonly ErrorDetail[] {
  return details.map(({ path, problem }) => {
    const name = fieldNameAt(path, names);
    return { path: name === undefined ? '' : `/${name}`, problem };
  });
}
