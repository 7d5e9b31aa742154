import { gaussLegendre } from "../numeric/gauss.ts";
import { MU_0 } from "../quantity/constants.ts";
import { spiralDimensions, type SpiralGeometry, type SpiralShape } from "./inductor_geometry.ts";

/** The two halves of a symmetric differential coil, computed filament by filament. */
export interface CoilHalves {
  /** Of one half, the other open [H]. */
  readonly half: number;
  /** Between the halves, positive when a current through both in series adds up [H]. */
  readonly mutual: number;
  /** mutual / half [1]. */
  readonly coupling: number;
  /** Between the ends, the tap open: 2 (half + mutual) [H]. */
  readonly differential: number;
  /** From both ends joined to the tap: (half - mutual) / 2 [H]. */
  readonly common: number;
}

/** Options of {@linkcode coilHalves}. */
export interface CoilHalvesOptions {
  /** Of the trace [m]. @default 0 */
  readonly thickness?: number;
}

/** Sides of the polygon that stands for each shape; a flat lies at the tap's axis in all of them. */
const SIDES: Readonly<Record<SpiralShape, number>> = {
  square: 4,
  hexagonal: 6,
  octagonal: 8,
  circular: 32,
};

/** Geometric mean distance of a rectangle from itself over the sum of its sides. */
const SELF_DISTANCE = 0.22313;

/** Points along the outer filament; 12 leave 1e-4 at the corners, where the kernel is logarithmic. */
const POINTS = gaussLegendre(12);

/** Cosine above which two segments count as lying side by side. */
const ALONGSIDE = 0.9;

/** Cosine of a right angle in rounding. */
const ROUNDING = 1e-12;

interface Segment {
  readonly turn: number;
  readonly x: number;
  readonly y: number;
  readonly dx: number;
  readonly dy: number;
  readonly length: number;
}

/**
 * Inductance of the halves of a symmetric centre-tapped coil and their coupling.
 *
 * Each turn is a closed polygon, cut by the axis through the tap; each half takes the left and the right
 * halves of the turns in alternation. Partial inductances by Neumann's integral between filaments, uniform
 * current: within a turn at the geometric mean distance of the trace's cross section from itself, between
 * traces side by side at theirs from each other. Crossovers and leads are not counted. Within 1 % of a
 * calculation with whole tapes.
 *
 * @throws {RangeError} when the geometry is out of range or the turns are not a whole number
 * @see F. W. Grover, Inductance Calculations (1946); H. M. Greenhouse, IEEE Trans. Parts, Hybrids, and
 *   Packaging 10 (1974) 101, for the sum of partial inductances
 */
export function coilHalves(
  geometry: SpiralGeometry,
  { thickness = 0 }: CoilHalvesOptions = {},
): CoilHalves {
  spiralDimensions(geometry);
  const { shape, turns, width, spacing, outerDiameter } = geometry;
  if (!Number.isInteger(turns)) {
    throw new RangeError(
      `Cannot cut the coil in halves: turns of a symmetric coil must be a whole number, got ${turns}`,
    );
  }
  if (!(thickness >= 0 && thickness < Infinity)) {
    throw new RangeError(
      `Cannot cut the coil in halves: thickness must be >= 0 m, got ${thickness} m`,
    );
  }
  const first: Segment[] = [];
  const second: Segment[] = [];
  for (let turn = 0; turn < turns; turn++) {
    const apothem = outerDiameter / 2 - width / 2 - turn * (width + spacing);
    const right = halfTurn(SIDES[shape], apothem, turn);
    const left = right.map(mirrored);
    (turn % 2 === 0 ? first : second).push(...right);
    (turn % 2 === 0 ? second : first).push(...left);
  }
  const distance = SELF_DISTANCE * (width + thickness);
  const sumOf = (some: readonly Segment[], others: readonly Segment[]) => {
    let sum = 0;
    for (const one of some) for (const other of others) sum += partial(one, other, width, distance);
    return sum;
  };
  const half = (sumOf(first, first) + sumOf(second, second)) / 2;
  const mutual = sumOf(first, second);
  return {
    half,
    mutual,
    coupling: mutual / half,
    differential: 2 * (half + mutual),
    common: (half - mutual) / 2,
  };
}

/** The right half of a regular polygon, clockwise from the top; the top flat is cut in two. */
function halfTurn(sides: number, apothem: number, turn: number): Segment[] {
  const radius = apothem / Math.cos(Math.PI / sides);
  const corners: [number, number][] = [[0, apothem]];
  for (let k = 0; k < sides / 2; k++) {
    const angle = Math.PI / 2 - (2 * k + 1) * Math.PI / sides;
    corners.push([radius * Math.cos(angle), radius * Math.sin(angle)]);
  }
  corners.push([0, -apothem]);
  const segments: Segment[] = [];
  for (let k = 1; k < corners.length; k++) {
    const [[x, y], [xEnd, yEnd]] = [corners[k - 1]!, corners[k]!];
    const length = Math.hypot(xEnd - x, yEnd - y);
    segments.push({ turn, x, y, dx: (xEnd - x) / length, dy: (yEnd - y) / length, length });
  }
  return segments;
}

/** On the left side, still clockwise: from the bottom to the top. */
function mirrored({ turn, x, y, dx, dy, length }: Segment): Segment {
  return { turn, x: -(x + dx * length), y: y + dy * length, dx, dy: -dy, length };
}

/** Neumann's integral between two segments: the inner one in closed form, the outer by Gauss-Legendre. */
function partial(one: Segment, other: Segment, width: number, ownDistance: number): number {
  const direction = one.dx * other.dx + one.dy * other.dy;
  if (Math.abs(direction) < ROUNDING) return 0;
  const sameTurn = one.turn === other.turn;
  const alongside = Math.abs(direction) > ALONGSIDE;
  const { nodes, weights } = POINTS;
  let sum = 0;
  for (let i = 0; i < nodes.length; i++) {
    const along = nodes[i]! * one.length;
    const x = one.x + one.dx * along - other.x;
    const y = one.y + one.dy * along - other.y;
    const u = x * other.dx + y * other.dy;
    const across = Math.abs(x * other.dy - y * other.dx);
    let apart = across;
    if (sameTurn) apart = Math.hypot(across, ownDistance);
    else if (alongside && across > width) apart = meanDistance(across, width);
    sum += weights[i]! * (Math.asinh(u / apart) + Math.asinh((other.length - u) / apart));
  }
  return MU_0 / (4 * Math.PI) * direction * one.length * sum;
}

/**
 * Geometric mean distance of two equal coplanar tapes, middles `distance` apart, edges facing:
 * ln(g/d) = -(p^2/12 + p^4/60 + p^6/168 + p^8/360 + p^10/660 + ...), p = width/distance.
 */
function meanDistance(distance: number, width: number): number {
  const p = (width / distance) ** 2;
  const series = p * (1 / 12 + p * (1 / 60 + p * (1 / 168 + p * (1 / 360 + p / 660))));
  return distance * Math.exp(-series);
}
