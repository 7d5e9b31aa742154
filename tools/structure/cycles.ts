import type { SourceFile } from "./source_tree.ts";

/** Every group of files that import one another, values or types, with one round trip through it. */
export function findCycles(files: readonly SourceFile[]): string[] {
  const known = new Set(files.map((file) => file.path));
  const edges = new Map(
    files.map((file) => [
      file.path,
      file.imports.map((entry) => entry.target).filter((target) => target !== undefined)
        .filter((target) => known.has(target)),
    ]),
  );
  const findings: string[] = [];
  const reported = new Set<string>();
  for (const { path } of files) {
    if (reported.has(path)) continue;
    const cycle = shortestWayBack(path, edges);
    if (!cycle) continue;
    cycle.forEach((member) => reported.add(member));
    findings.push(`${path}:1: import cycle: ${[...cycle, path].join(" -> ")}`);
  }
  return findings;
}

/** Files of the shortest way from `start` back to itself, by breadth-first search. */
function shortestWayBack(
  start: string,
  edges: ReadonlyMap<string, readonly string[]>,
): string[] | undefined {
  const cameFrom = new Map<string, string>();
  const queue = [start];
  for (const here of queue) {
    for (const next of edges.get(here) ?? []) {
      if (next === start) {
        const way = [here];
        for (let back = cameFrom.get(here); back !== undefined; back = cameFrom.get(back)) {
          way.push(back);
        }
        return way.reverse();
      }
      if (!cameFrom.has(next)) {
        cameFrom.set(next, here);
        queue.push(next);
      }
    }
  }
  return undefined;
}
