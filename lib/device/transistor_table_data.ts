/** Charges of three terminals on the grid, shape (vgs, vds, vbs) row-major each [C]; the bulk's balances. */
export interface TransistorTableCharges {
  readonly drain: Float64Array;
  readonly gate: Float64Array;
  readonly source: Float64Array;
}

/**
 * A characterized transistor on a grid of terminal voltages, all signs as measured: a p transistor has
 * negative voltages and currents. Arrays of values have shape (vgs, vds, vbs), row-major.
 */
export interface TransistorTableData {
  /** Gate-source voltages, strictly rising, at least 4 [V]. */
  readonly gateVoltages: Float64Array;
  /** Drain-source voltages, strictly rising, at least 4, zero among them [V]. */
  readonly drainVoltages: Float64Array;
  /** Bulk-source voltages, strictly rising [V]; one value when the table has no body voltage. */
  readonly bulkVoltages: Float64Array;
  /** Into the drain [A]. */
  readonly current: Float64Array;
  /** Change of the current with the gate voltage [S]. */
  readonly gm?: Float64Array;
  /** Change of the current with the drain voltage [S]. */
  readonly gds?: Float64Array;
  /** Change of the current with the bulk voltage [S]. */
  readonly gmb?: Float64Array;
  readonly charges?: TransistorTableCharges;
}
