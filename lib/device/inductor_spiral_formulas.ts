import { MU_0 } from "../quantity/constants.ts";
import {
  type CoilWarning,
  type SpiralDimensions,
  spiralDimensions,
  type SpiralGeometry,
  type SpiralShape,
} from "./inductor_geometry.ts";

/** Closed forms for the inductance of a planar spiral. */
export const SPIRAL_FORMULAS = ["modified_wheeler", "current_sheet", "monomial"] as const;

/** Closed form for the inductance of a planar spiral. */
export type SpiralFormula = (typeof SPIRAL_FORMULAS)[number];

/** Options of {@linkcode spiralInductance}. */
export interface SpiralInductanceOptions {
  /** @default "current_sheet" */
  readonly formula?: SpiralFormula;
}

/** Inductance of a spiral with where the formula was strained. */
export interface SpiralInductance {
  /** [H] */
  readonly inductance: number;
  readonly formula: SpiralFormula;
  /** Empty when the spiral lies inside the formula's range. */
  readonly warnings: readonly CoilWarning[];
}

/** A shape with straight sides. */
export type PolygonShape = Exclude<SpiralShape, "circular">;

/** K1, K2 of the modified Wheeler formula. */
export const MODIFIED_WHEELER_COEFFICIENTS: Readonly<
  Record<PolygonShape, readonly [number, number]>
> = {
  square: [2.34, 2.75],
  hexagonal: [2.33, 3.82],
  octagonal: [2.25, 3.55],
};

/** c1 to c4 of the current-sheet formula. */
export const CURRENT_SHEET_COEFFICIENTS: Readonly<
  Record<SpiralShape, readonly [number, number, number, number]>
> = {
  square: [1.27, 2.07, 0.18, 0.13],
  hexagonal: [1.09, 2.23, 0, 0.17],
  octagonal: [1.07, 2.29, 0, 0.19],
  circular: [1, 2.46, 0, 0.2],
};

/** beta and the exponents of dout, w, davg, n, s of the monomial fit; nH and um. */
export const MONOMIAL_COEFFICIENTS: Readonly<
  Record<PolygonShape, readonly [number, number, number, number, number, number]>
> = {
  square: [1.62e-3, -1.21, -0.147, 2.4, 1.78, -0.03],
  hexagonal: [1.28e-3, -1.24, -0.174, 2.47, 1.77, -0.049],
  octagonal: [1.33e-3, -1.21, -0.163, 2.43, 1.75, -0.049],
};

/** Fill ratios that the formulas were compared over. */
const FILL_RATIO = { lowest: 0.1, highest: 0.9 };

/** Above this spacing over width the current sheet's error passes 8 %. */
const GREATEST_SPACING = 3;

const NANO = 1e-9;
const MICRO = 1e-6;

/**
 * Inductance of a planar spiral at low frequency by one of three closed forms.
 *
 * - modified Wheeler: L = K1 mu0 n^2 davg / (1 + K2 rho)
 * - current sheet: L = (mu0 n^2 davg c1 / 2) (ln(c2/rho) + c3 rho + c4 rho^2)
 * - monomial: L = beta dout^a1 w^a2 davg^a3 n^a4 s^a5 in nH and um
 *
 * Typical errors of 2 to 3 %, up to 8 % for the current sheet at a spacing of three widths. The circle
 * has the current sheet only.
 *
 * @throws {RangeError} when the geometry is out of range
 * @throws {TypeError} when the formula is not known or has no coefficients for the shape
 * @see S. S. Mohan, M. del Mar Hershenson, S. P. Boyd, T. H. Lee, "Simple accurate expressions for planar
 *   spiral inductances", IEEE J. Solid-State Circuits 34 (1999) 1419, tables I to III
 */
export function spiralInductance(
  geometry: SpiralGeometry,
  { formula = "current_sheet" }: SpiralInductanceOptions = {},
): SpiralInductance {
  const dimensions = spiralDimensions(geometry);
  return {
    inductance: evaluate(formula, geometry, dimensions),
    formula,
    warnings: strains(geometry, dimensions, formula),
  };
}

function evaluate(
  formula: SpiralFormula,
  geometry: SpiralGeometry,
  { averageDiameter, fillRatio }: SpiralDimensions,
): number {
  const { shape, turns, width, spacing, outerDiameter } = geometry;
  switch (formula) {
    case "current_sheet": {
      const [c1, c2, c3, c4] = CURRENT_SHEET_COEFFICIENTS[shape];
      const shapeFactor = Math.log(c2 / fillRatio) + fillRatio * (c3 + c4 * fillRatio);
      return MU_0 * turns ** 2 * averageDiameter * c1 / 2 * shapeFactor;
    }
    case "modified_wheeler": {
      const [k1, k2] = MODIFIED_WHEELER_COEFFICIENTS[polygon(shape, formula)];
      return k1 * MU_0 * turns ** 2 * averageDiameter / (1 + k2 * fillRatio);
    }
    case "monomial": {
      const [beta, a1, a2, a3, a4, a5] = MONOMIAL_COEFFICIENTS[polygon(shape, formula)];
      return NANO * beta * (outerDiameter / MICRO) ** a1 * (width / MICRO) ** a2 *
        (averageDiameter / MICRO) ** a3 * turns ** a4 * (spacing / MICRO) ** a5;
    }
    default:
      throw new TypeError(
        `Cannot compute the inductance: formula must be one of ${
          SPIRAL_FORMULAS.join(", ")
        }, got ` +
          `${formula satisfies never}`,
      );
  }
}

function polygon(shape: SpiralShape, formula: SpiralFormula): PolygonShape {
  if (shape !== "circular") return shape;
  throw new TypeError(
    `Cannot compute the inductance: a circular spiral needs the formula current_sheet, got ${formula}`,
  );
}

function strains(
  { width, spacing }: SpiralGeometry,
  { fillRatio }: SpiralDimensions,
  formula: SpiralFormula,
): CoilWarning[] {
  const warnings: CoilWarning[] = [];
  const { lowest, highest } = FILL_RATIO;
  if (!(fillRatio >= lowest && fillRatio <= highest)) {
    warnings.push({
      quantity: "fill ratio",
      value: fillRatio,
      lowest,
      highest,
      unit: "1",
      text:
        `fill ratio ${fillRatio.toPrecision(3)} lies outside ${lowest} to ${highest}, where the ` +
        `formula ${formula} was compared with measured and field-solved spirals`,
    });
  }
  if (!(spacing <= GREATEST_SPACING * width)) {
    warnings.push({
      quantity: "spacing over width",
      value: spacing / width,
      lowest: 0,
      highest: GREATEST_SPACING,
      unit: "1",
      text:
        `spacing is ${(spacing / width).toPrecision(3)} widths; above ${GREATEST_SPACING} the ` +
        "error may pass 8 %",
    });
  }
  return warnings;
}
