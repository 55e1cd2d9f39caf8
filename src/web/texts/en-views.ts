/** Words that every described form shares, in English. */
export const viewTexts = {
  add: 'Add',
  remove: 'Remove',
  unnamed: 'Not named yet',
  unknown: 'not known',
  unit: 'Unit',
  unsaved: 'Not saved yet. Rows were added or removed below; save to keep them.',
  damaged: 'is not a field of this form',
} as const;
