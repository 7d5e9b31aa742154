import type { Orbit } from "./orbit.ts";
import type { Path } from "./period_map.ts";

/** Most orbits an extrapolation goes through. */
const EXTRAPOLATED = 4;

/** A path near an orbit of a neighbouring system, from {@linkcode extrapolateOrbits}. */
export interface OrbitGuess {
  readonly status: "guess";
  readonly path: Path;
  /** The orbit whose mesh, coordinates and work arrays are taken over. */
  readonly neighbour: Orbit;
}

function sameMesh(a: Float64Array, b: Float64Array): boolean {
  return a.length === b.length && a.every((value, k) => value === b[k]);
}

/**
 * A guess of the orbit at a parameter value from up to four orbits at other values on the same mesh,
 * by polynomial extrapolation; fewer are used where meshes differ.
 *
 * @param orbits nearest last, at least one
 * @param at parameter values of the orbits and the value wanted, in any one unit
 */
export function extrapolateOrbits(
  orbits: readonly Orbit[],
  at: { readonly values: readonly number[]; readonly wanted: number },
): OrbitGuess {
  const neighbour = orbits[orbits.length - 1];
  if (!neighbour || at.values.length !== orbits.length) {
    throw new TypeError(
      `Cannot extrapolate orbits: as many values as orbits are needed, at least one, found ${orbits.length} orbits and ${at.values.length} values`,
    );
  }
  const usable: { path: Path; value: number }[] = [];
  for (let k = orbits.length - 1; k >= 0 && usable.length < EXTRAPOLATED; k--) {
    const { path } = orbits[k]!.discrete;
    if (!sameMesh(path.mesh, neighbour.discrete.path.mesh)) break;
    usable.push({ path, value: at.values[k]! });
  }
  const weights = usable.map((own, j) =>
    usable.reduce(
      (product, other, k) =>
        k === j ? product : product * (at.wanted - other.value) / (own.value - other.value),
      1,
    )
  );
  const combine = (read: (path: Path) => Float64Array) => {
    const sum = new Float64Array(read(neighbour.discrete.path).length);
    usable.forEach(({ path }, k) => {
      const values = read(path);
      const weight = weights[k]!;
      for (let i = 0; i < sum.length; i++) sum[i]! += weight * values[i]!;
    });
    return sum;
  };
  return {
    status: "guess",
    neighbour,
    path: {
      mesh: neighbour.discrete.path.mesh,
      stages: combine((path) => path.stages),
      charges: combine((path) => path.charges),
      period: usable.reduce((sum, { path }, k) => sum + weights[k]! * path.period, 0),
    },
  };
}
