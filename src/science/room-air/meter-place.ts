import { alarmTime, type MeterTraits } from './meter-alarm.js';

/** A place where a meter could hang, with the true reading there. */
export interface MeterPlace {
  readonly timesS: readonly number[];
  readonly values: readonly number[];
}

/**
 * Place at which a meter alarms first, with the time of its alarm [s]; undefined when at none.
 *
 *   least over places of alarmTime
 *
 * @param places places with rising times [s] and true readings [-]
 * @param meter  response time [s], alarm level [-] and side
 * @returns index of the place [-] and time of the alarm [s]
 * Source: own-room-air. Assumes: as alarmTime; the first of equals. Accuracy: that of t90.
 * @example firstAlarm([{ timesS: [0, 9], values: [0, 0] }, { timesS: [0, 9], values: [1, 1] }], { responseTimeS: 10, alarmLevel: 0.5, side: 'above' }) // {'index':1,'atS':0}
 */
export function firstAlarm(
  places: readonly MeterPlace[],
  meter: MeterTraits,
): { readonly index: number; readonly atS: number } | undefined {
  let first: { index: number; atS: number } | undefined;
  for (const [index, { timesS, values }] of places.entries()) {
    const atS = alarmTime(timesS, values, meter);
    if (atS !== undefined && (first === undefined || atS < first.atS)) first = { index, atS };
  }
  return first;
}
