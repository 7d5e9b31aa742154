import type { Orbit, OrbitFailure, Work } from "./orbit.ts";

const NO_WORK: Work = { evaluations: 0, factorizations: 0, passes: 0, transientSteps: 0 };

/**
 * A failure to find an orbit.
 *
 * @internal
 */
export function orbitFailure(
  status: OrbitFailure["status"],
  reason: string,
  { history = [], work = NO_WORK, orbit }: {
    history?: readonly number[];
    work?: Work;
    orbit?: Orbit;
  } = {},
): OrbitFailure {
  return { status, reason, history, work, ...(orbit ? { orbit } : {}) };
}
