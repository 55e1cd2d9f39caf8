import type { Control } from './catalogue-types.js';
import type { ChosenControl } from './plan-file.js';

/**
 * A parameter of a chosen control: what the plan states, else the default of the catalogue; kept
 * within its range. Undefined where neither says anything.
 */
export function controlValue(
  control: Control,
  chosen: ChosenControl,
  key: string,
): number | undefined {
  const parameter = control.parameters.find((one) => one.key === key);
  const value = statedValue(control, chosen, key) ?? parameter?.default;
  if (value === undefined) return undefined;
  return Math.min(parameter?.high ?? value, Math.max(parameter?.low ?? value, value));
}

/** What the plan itself states of a parameter; a bare value is that of the first. */
export function statedValue(
  control: Control,
  chosen: ChosenControl,
  key: string,
): number | undefined {
  return chosen.values?.[key] ?? (control.parameters[0]?.key === key ? chosen.value : undefined);
}
