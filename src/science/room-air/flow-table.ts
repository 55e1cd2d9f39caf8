/**
 * All flows of one moment between zones, in plain arrays so that a step makes no garbage.
 *
 *   size of flow i = base_i + factor_i F_v, v its variable (none: -1)
 *
 * A variable is a flow that depends on how full its layers are: F_v with its slopes to the volumes
 * of two of them, and the range in which it may lie.
 */
export interface FlowTable {
  count: number;
  readonly from: Int32Array;
  readonly to: Int32Array;
  readonly base: Float64Array;
  readonly variable: Int32Array;
  readonly factor: Float64Array;
  variables: number;
  /** Variables at the state for which the table was made. */
  readonly start: Float64Array;
  /** The same at the end of the step last taken. */
  readonly value: Float64Array;
  readonly zoneA: Int32Array;
  readonly slopeA: Float64Array;
  readonly zoneB: Int32Array;
  readonly slopeB: Float64Array;
  readonly most: Float64Array;
  /** Volume that sources add to each zone [m3/s]. */
  readonly volumeSource: Float64Array;
  /** Components that sources add, zone by zone [m3/s]. */
  readonly amountSource: Float64Array;
  /** Components that sources bring into the whole, and that breathing takes out of it [m3/s]. */
  readonly into: Float64Array;
  readonly out: Float64Array;
}

/** An empty table for a number of flows, variables, zones and components. */
export function flowTable(
  flows: number,
  variables: number,
  zones: number,
  components: number,
): FlowTable {
  return {
    count: 0,
    from: new Int32Array(flows),
    to: new Int32Array(flows),
    base: new Float64Array(flows),
    variable: new Int32Array(flows),
    factor: new Float64Array(flows),
    variables: 0,
    start: new Float64Array(variables),
    value: new Float64Array(variables),
    zoneA: new Int32Array(variables),
    slopeA: new Float64Array(variables),
    zoneB: new Int32Array(variables),
    slopeB: new Float64Array(variables),
    most: new Float64Array(variables),
    volumeSource: new Float64Array(zones),
    amountSource: new Float64Array(zones * components),
    into: new Float64Array(components),
    out: new Float64Array(components),
  };
}

/** Adds a flow between two zones; nothing when it is 0 or leads nowhere. */
export function addFlow(table: FlowTable, from: number, to: number, flow: number): void {
  if (flow <= 0 || from === to) return;
  const i = table.count++;
  table.from[i] = from;
  table.to[i] = to;
  table.base[i] = flow;
  table.variable[i] = -1;
}

/** Adds a flow that is a base plus a share of the last variable. */
export function addSharedFlow(
  table: FlowTable,
  from: number,
  to: number,
  base: number,
  factor: number,
): void {
  if (from === to || (base === 0 && factor === 0)) return;
  const i = table.count++;
  table.from[i] = from;
  table.to[i] = to;
  table.base[i] = base;
  table.variable[i] = table.variables - 1;
  table.factor[i] = factor;
}

/** Adds a variable: its value now, its slope to the volume of a zone, and the most it may be. */
export function addVariable(
  table: FlowTable,
  value: number,
  zoneA: number,
  slopeA: number,
  most: number,
  zoneB = -1,
  slopeB = 0,
): void {
  const v = table.variables++;
  table.start[v] = value;
  table.value[v] = value;
  table.zoneA[v] = zoneA;
  table.slopeA[v] = slopeA;
  table.zoneB[v] = zoneB;
  table.slopeB[v] = slopeB;
  table.most[v] = most;
}

/**
 * Size of a flow at the present values of the variables [m3/s].
 *
 *   base_i + factor_i F_v
 *
 * @param table flows
 * @param i     index of the flow [-]
 * @returns size [m3/s]; below 0 for a weir that has turned round
 * Source: own-derivation. Assumes: an index within the table. Accuracy: exact.
 */
export function flowSize(table: FlowTable, i: number): number {
  const base = table.base[i] ?? 0;
  const v = table.variable[i] ?? -1;
  return v < 0 ? base : base + (table.factor[i] ?? 0) * (table.value[v] ?? 0);
}
