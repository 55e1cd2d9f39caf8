import type { Control } from './catalogue-types.js';
import { controlValue, statedValue } from './control-values.js';
import { quantityText } from './figure-text.js';
import type { ChosenControl, PlanFile } from './plan-file.js';
import { sentence } from './sentence.js';

const slotPattern = /\{([A-Za-z0-9]+)\}/g;
/** Printed where nobody has stated a number: a gap on the sheet, never a guess. */
const gap = '……';

/** Digits that say nothing: 6.00 kg was stated as 6 kg. */
const withoutNoughts = (text: string): string =>
  text.replace(/\.0+(?=\D|$)/, '').replace(/(\.\d*[1-9])0+(?=\D|$)/, '$1');

/** A parameter of a control as a crew reads it. */
const parameterText = (value: number, unit: string, key: string): string =>
  withoutNoughts(plainParameter(value, unit, key));

function plainParameter(value: number, unit: string, key: string): string {
  switch (unit) {
    case 'm3/s':
      return quantityText(value, 'm3PerS');
    case 's':
      return quantityText(value, 's');
    case 'm':
      return quantityText(value, 'm');
    case 'm3':
      return quantityText(value, 'm3');
    case 'kg':
      return quantityText(value, 'kg');
    case '1/h':
      return key.startsWith('loss')
        ? `${String(Number((100 * value).toPrecision(2)))} %`
        : `${String(Number(value.toPrecision(2)))} air changes an hour`;
    case '1':
      return key.endsWith('Share')
        ? `${String(Number((100 * value).toPrecision(2)))} %`
        : String(Number(value.toPrecision(4)));
    default:
      return `${String(Number(value.toPrecision(3)))} ${unit}`;
  }
}

/** What stands in the slots of a control as it is chosen for a plan. */
function slotText(
  slot: string,
  control: Control,
  chosen: ChosenControl,
  plan: PlanFile,
): string | null {
  const titled = (rows: readonly { id: string; title?: string }[], id: string | undefined) =>
    id === undefined ? null : (rows.find((row) => row.id === id)?.title ?? id);
  const act = plan.acts.find((one) => one.id === chosen.act);
  switch (slot) {
    case 'act':
      return titled(plan.acts, chosen.act) ?? 'every act';
    case 'space':
      return titled(plan.venue.spaces, chosen.space ?? act?.space) ?? 'every space';
    case 'group':
      return titled(plan.event.audience, chosen.group) ?? 'the audience';
    case 'gas':
      return chosen.gas ?? null;
    case 'cap': {
      const kg = statedValue(control, chosen, 'capKg');
      const volume = statedValue(control, chosen, 'capM3');
      if (kg !== undefined) return parameterText(kg, 'kg', 'capKg');
      return volume === undefined ? null : parameterText(volume, 'm3', 'capM3');
    }
    default: {
      const value = controlValue(control, chosen, slot);
      const unit = control.parameters.find(({ key }) => key === slot)?.unit ?? '';
      if (value !== undefined) return parameterText(value, unit, slot);
      return control.effect === 'allOutdoorAir' ? 'all the air that it moves' : null;
    }
  }
}

/** A control as it is done here: its steps in order, and the line that the crew ticks. */
export function controlWords(
  control: Control,
  chosen: ChosenControl,
  plan: PlanFile,
): { readonly steps: readonly string[]; readonly checklistLine: string } {
  const filled = (text: string) => {
    return sentence(
      text.replaceAll(
        slotPattern,
        (_, slot: string) => slotText(slot, control, chosen, plan) ?? gap,
      ),
    );
  };
  return { steps: control.steps.map(filled), checklistLine: filled(control.line) };
}

/** Words of a demonstration for a control, with what the plan says of the act in their slots. */
export function offeredWords(
  text: string,
  numbers: Readonly<Record<string, string | undefined>>,
): string {
  return text.replaceAll(slotPattern, (_, slot: string) => numbers[slot] ?? gap);
}
