/** Outlines of a planar spiral. */
export const SPIRAL_SHAPES = ["square", "hexagonal", "octagonal", "circular"] as const;

/** Outline of a planar spiral. */
export type SpiralShape = (typeof SPIRAL_SHAPES)[number];

/** A planar spiral of one metal layer. */
export interface SpiralGeometry {
  readonly shape: SpiralShape;
  /** Number of turns; may be a fraction [1]. */
  readonly turns: number;
  /** Width of the trace [m]. */
  readonly width: number;
  /** Gap between neighbouring turns [m]. */
  readonly spacing: number;
  /** Across the flats, from outer edge to outer edge [m]. */
  readonly outerDiameter: number;
}

/** What follows from a {@linkcode SpiralGeometry}. */
export interface SpiralDimensions {
  /** From inner edge to inner edge [m]. */
  readonly innerDiameter: number;
  /** Half the sum of the inner and outer diameters [m]. */
  readonly averageDiameter: number;
  /** (outer - inner) / (outer + inner) [1]. */
  readonly fillRatio: number;
  /** Of the trace along its middle [m]. */
  readonly length: number;
}

/** A figure outside the range in which a formula has been shown to hold. */
export interface CoilWarning {
  /** What is out of range, in words. */
  readonly quantity: string;
  readonly value: number;
  /** Range in which the formula holds, same unit as the value. */
  readonly lowest: number;
  readonly highest: number;
  /** SI unit, `1` for a pure number. */
  readonly unit: string;
  /** One sentence for a reader. */
  readonly text: string;
}

/** Perimeter over the diameter across flats: N tan(pi/N) for N sides. */
const PERIMETER: Readonly<Record<SpiralShape, number>> = {
  square: 4,
  hexagonal: 6 * Math.tan(Math.PI / 6),
  octagonal: 8 * Math.tan(Math.PI / 8),
  circular: Math.PI,
};

/**
 * Diameters, fill ratio and trace length of a spiral.
 *
 * din = dout - 2 (n w + (n - 1) s), rho = (dout - din)/(dout + din), length = n times the perimeter at
 * the average diameter (concentric turns; leads and the bridge are not counted).
 *
 * @throws {RangeError} when a dimension is out of range or the turns do not fit
 * @throws {TypeError} when the shape is not known
 */
export function spiralDimensions(geometry: SpiralGeometry): SpiralDimensions {
  const { shape, turns, width, spacing, outerDiameter } = geometry;
  if (!SPIRAL_SHAPES.includes(shape)) {
    throw new TypeError(
      `Cannot describe the spiral: shape must be one of ${SPIRAL_SHAPES.join(", ")}, got ${shape}`,
    );
  }
  demand(turns >= 1 && turns < Infinity, "turns must be a number >= 1", `${turns}`);
  demand(width > 0 && width < Infinity, "width must be > 0 m", `${width} m`);
  demand(spacing > 0 && spacing < Infinity, "spacing must be > 0 m", `${spacing} m`);
  demand(
    outerDiameter > 0 && outerDiameter < Infinity,
    "outer diameter must be > 0 m",
    `${outerDiameter} m`,
  );
  const innerDiameter = outerDiameter - 2 * (turns * width + (turns - 1) * spacing);
  demand(
    innerDiameter > 0,
    `outer diameter must leave an opening inside ${turns} turns, ` +
      `> ${outerDiameter - innerDiameter} m`,
    `${outerDiameter} m`,
  );
  const averageDiameter = (outerDiameter + innerDiameter) / 2;
  return {
    innerDiameter,
    averageDiameter,
    fillRatio: (outerDiameter - innerDiameter) / (outerDiameter + innerDiameter),
    length: turns * PERIMETER[shape] * averageDiameter,
  };
}

function demand(condition: boolean, wording: string, value: string): void {
  if (!condition) throw new RangeError(`Cannot describe the spiral: ${wording}, got ${value}`);
}
