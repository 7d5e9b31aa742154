/**
 * What a table must be before it is used, and its change of signs.
 *
 * @module
 */
import type { TensorSpline } from "../numeric/spline_tensor.ts";
import type { TransistorTableData } from "./transistor_table_data.ts";

/** A voltage this near to zero is zero [V]. */
const ZERO_VOLTAGE = 1e-9;
/** Part of the largest current that may flow at zero drain-source voltage: an instrument's offset. */
const ZERO_CURRENT = 1e-4;
/**
 * Part of the largest conductance by which a column of conductances may miss the slope of the current. A
 * coarse grid misses by some per cent at its edges; a wrong sign or unit by 1 or more.
 */
const CONTRADICTION = 0.3;
/** Fewest gate and drain voltages for a cubic. */
const FEWEST = 4;

/** Demands shapes, a zero drain-source voltage and no current there. */
export function checkTable(data: TransistorTableData): void {
  const { gateVoltages, drainVoltages, bulkVoltages, current, gm, gds, gmb, charges } = data;
  const points = gateVoltages.length * drainVoltages.length * bulkVoltages.length;
  for (const [name, array] of Object.entries({ current, gm, gds, gmb, ...charges })) {
    if (array === undefined) continue;
    if (array.length !== points) {
      throw new TypeError(
        `Cannot use the transistor table: expected ${points} values of ${name}, got ${array.length}`,
      );
    }
    if (!array.every(Number.isFinite)) {
      throw new RangeError(
        `Cannot use the transistor table: values of ${name} must be finite, got ${
          array.find((value) => !Number.isFinite(value))
        }`,
      );
    }
  }
  for (const [name, axis] of Object.entries({ vgs: gateVoltages, vds: drainVoltages })) {
    if (axis.length >= FEWEST) continue;
    throw new RangeError(
      `Cannot use the transistor table: ${name} must take at least ${FEWEST} values, got ${axis.length}`,
    );
  }
  const zero = drainVoltages.findIndex((v) => Math.abs(v) <= ZERO_VOLTAGE);
  if (zero < 0) {
    throw new RangeError(
      `Cannot use the transistor table: vds must take the value 0 V, got ${drainVoltages[0]} V to ${
        drainVoltages.at(-1)
      } V`,
    );
  }
  const largest = current.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
  if (!(largest > 0)) {
    throw new RangeError(
      "Cannot use the transistor table: a current must differ from 0 A, got none",
    );
  }
  gateVoltages.forEach((gate, i) => {
    bulkVoltages.forEach((_, k) => {
      const found = current[(i * drainVoltages.length + zero) * bulkVoltages.length + k]!;
      if (Math.abs(found) <= ZERO_CURRENT * largest) return;
      throw new RangeError(
        `Cannot use the transistor table: the current at vds 0 V must be 0 A, got ${found} A at vgs ${gate} V`,
      );
    });
  });
}

/** The table of a p transistor as that of an n one: voltages, current and charges change their signs. */
export function characterizedAsN(data: TransistorTableData): TransistorTableData {
  const negated = (values: Float64Array) => values.map((value) => -value || 0).reverse();
  const turned = (values: Float64Array) => values.slice().reverse();
  const { gateVoltages, drainVoltages, bulkVoltages, current, gm, gds, gmb, charges } = data;
  // Reversing all three axes reverses the row-major array as a whole.
  return {
    gateVoltages: negated(gateVoltages),
    drainVoltages: negated(drainVoltages),
    bulkVoltages: negated(bulkVoltages),
    current: negated(current),
    ...(gm ? { gm: turned(gm) } : {}),
    ...(gds ? { gds: turned(gds) } : {}),
    ...(gmb ? { gmb: turned(gmb) } : {}),
    ...(charges
      ? {
        charges: {
          drain: negated(charges.drain),
          gate: negated(charges.gate),
          source: negated(charges.source),
        },
      }
      : {}),
  };
}

/**
 * How far the conductances of a table in n-type signs differ from the slopes of its interpolated current, one note each;
 * places are named in the device's own signs.
 *
 * @throws {RangeError} when one contradicts the current
 */
export function conductanceErrors(
  data: TransistorTableData,
  { spline, sign }: { readonly spline: TensorSpline; readonly sign: number },
): string[] {
  const { gateVoltages, drainVoltages, bulkVoltages } = data;
  const out = new Float64Array(4 * spline.quantities);
  return (["gm", "gds", "gmb"] as const).flatMap((name, derivative) => {
    const column = data[name];
    // A spline over one body voltage has no slope along it.
    if (column === undefined || (name === "gmb" && bulkVoltages.length === 1)) return [];
    let largest = 0;
    let error = 0;
    let place = 0;
    let at = "";
    gateVoltages.forEach((vgs) => {
      drainVoltages.forEach((vds) => {
        bulkVoltages.forEach((vbs) => {
          spline.evaluate(vgs, vds, vbs, out);
          const given = column[place++]!;
          largest = Math.max(largest, Math.abs(given), Math.abs(out[1 + derivative]!));
          const difference = Math.abs(given - out[1 + derivative]!);
          if (!(difference > error)) return;
          error = difference;
          at = `vgs ${sign * vgs} V, vds ${sign * vds} V, vbs ${sign * vbs} V`;
        });
      });
    });
    const part = largest > 0 ? error / largest : 0;
    if (part > CONTRADICTION) {
      throw new RangeError(
        `Cannot use the transistor table: ${name} must be the slope of the current, got a difference of ${error} S at ${at}`,
      );
    }
    return [
      `${name}: agrees with the slope of the current to ${
        (100 * part).toPrecision(2)
      } % of its largest value`,
    ];
  });
}
