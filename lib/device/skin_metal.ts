/** A conductor: resistivity at one temperature and how it grows. */
export interface ConductorMetal {
  /** At `referenceTemperature` [ohm m]. */
  readonly resistivity: number;
  /** Relative growth, at `referenceTemperature` [1/K]. */
  readonly temperatureCoefficient: number;
  /** [K] */
  readonly referenceTemperature: number;
}

const ROOM = 293.15;

/**
 * Pure bulk metals at 20 C. Films on a chip have 5 to 25 % more (common practice): take the sheet
 * resistance times the thickness of the process where it is known.
 *
 * Resistivities: CRC Handbook of Chemistry and Physics; temperature coefficients from memory.
 */
export const BULK_METALS: Readonly<Record<"copper" | "aluminium" | "gold", ConductorMetal>> = {
  copper: { resistivity: 1.68e-8, temperatureCoefficient: 3.9e-3, referenceTemperature: ROOM },
  aluminium: { resistivity: 2.65e-8, temperatureCoefficient: 4.3e-3, referenceTemperature: ROOM },
  gold: { resistivity: 2.2e-8, temperatureCoefficient: 3.7e-3, referenceTemperature: ROOM },
};

/**
 * Resistivity at a temperature, linear about the reference: rho (1 + alpha (T - T_ref)).
 *
 * @param temperature [K]
 * @returns [ohm m]
 * @throws {RangeError} when the metal's figures are out of range or the line has left the positive numbers
 */
export function resistivityAt(metal: ConductorMetal, temperature: number): number {
  if (!(metal.resistivity > 0)) {
    throw new RangeError(
      `Cannot compute the resistivity: resistivity must be > 0 ohm m, got ${metal.resistivity} ohm m`,
    );
  }
  const growth = metal.temperatureCoefficient * (temperature - metal.referenceTemperature);
  if (!(growth > -1)) {
    throw new RangeError(
      `Cannot compute the resistivity: temperature must be one where the linear law is positive, got ` +
        `${temperature} K`,
    );
  }
  return metal.resistivity * (1 + growth);
}
