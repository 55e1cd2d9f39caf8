import { OXYGEN_IN_DRY_AIR } from './air-constants.js';
import type { AirModel } from './air-model.js';
import type { AirSeries } from './air-result.js';
import type { FlatTrack } from './answer-track.js';
import { oxygenPartialPressure } from './water-vapour.js';

/** Of each output time the last node at or before it; at a jump the state after it. */
export function outputRows(nodesS: Float64Array, timesS: readonly number[]): Int32Array {
  let at = 0;
  return Int32Array.from(timesS, (t) => {
    while ((nodesS[at + 1] ?? Infinity) <= t) at++;
    return at;
  });
}

/** The rows of a track at chosen times, one after the other; at a jump the state after it. */
export function rowsAt(
  { timesS, values, width }: Pick<FlatTrack, 'timesS' | 'values' | 'width'>,
  wantedS: readonly number[],
): Float64Array {
  const rows = new Float64Array(wantedS.length * width);
  for (const [i, row] of outputRows(timesS, wantedS).entries()) {
    rows.set(values.subarray(row * width, (row + 1) * width), i * width);
  }
  return rows;
}

/** The series of a track at chosen rows. */
export function seriesOf(
  model: AirModel,
  { values, width }: Pick<FlatTrack, 'values' | 'width'>,
  rows: Int32Array,
): AirSeries {
  const { pressurePa } = model.input.ambient;
  const count = rows.length;
  const column = (): number[] => new Array<number>(count).fill(0.5);
  const oxygenFraction = column();
  const oxygenPartialPressurePa = column();
  const gasFraction = model.gases.map((gas) => [gas, column()] as const);
  for (let i = 0; i < count; i++) {
    const at = (rows[i] ?? 0) * width;
    const oxygen = values[at] ?? 0;
    oxygenFraction[i] = oxygen;
    oxygenPartialPressurePa[i] = oxygenPartialPressure(
      oxygen,
      Math.max(0, 1 - oxygen / OXYGEN_IN_DRY_AIR),
      pressurePa,
      model.vapourPressurePa,
    );
  }
  for (const [g, [, series]] of gasFraction.entries()) {
    for (let i = 0; i < count; i++) series[i] = values[(rows[i] ?? 0) * width + g + 1] ?? 0;
  }
  return { oxygenFraction, oxygenPartialPressurePa, gasFraction: Object.fromEntries(gasFraction) };
}
