import type { SourceFile } from "./source_tree.ts";

const BELOW_CIRCUIT = ["lib/quantity", "lib/numeric", "lib/orbit", "lib/device"];
const BELOW_DESIGN = [...BELOW_CIRCUIT, "lib/circuit", "lib/noise"];
const ALL_FLOORS = [...BELOW_DESIGN, "lib/design"];

/** What each part may import besides itself. `lib` is lib/mod.ts. */
const MAY_IMPORT: Readonly<Record<string, readonly string[]>> = {
  "lib/quantity": [],
  "lib/numeric": [],
  "lib/orbit": ["lib/quantity", "lib/numeric"],
  "lib/device": ["lib/quantity", "lib/numeric"],
  "lib/circuit": BELOW_CIRCUIT,
  "lib/noise": [...BELOW_CIRCUIT, "lib/circuit"],
  "lib/design": BELOW_DESIGN,
  "lib": ALL_FLOORS,
  "kernel": [...ALL_FLOORS, "lib"],
  "reports": [...ALL_FLOORS, "lib", "kernel"],
  "notebooks": ["lib", "kernel"],
  "bench": [...ALL_FLOORS, "lib", "kernel", "reports"],
  "tools": [...ALL_FLOORS, "lib", "kernel", "reports"],
  "tests": [...ALL_FLOORS, "lib", "kernel", "reports", "bench", "tools"],
};

/** Packages that only some parts may import; every other package of deno.json is free. */
const PACKAGE_PARTS: Readonly<Record<string, readonly string[]>> = {
  "@observablehq/plot": ["kernel", "reports", "tests", "bench"],
  "linkedom": ["kernel", "reports", "tests", "bench"],
  "temml": ["kernel", "reports", "tests", "bench"],
  "markdown-it": ["kernel", "reports", "tests", "tools"],
  "typescript": ["kernel", "tests", "tools"],
  "fast-check": ["tests"],
  "odex": ["tests", "bench"],
  "playwright-core": ["tests", "tools"],
};

/** The part of the tree a file belongs to: a floor of lib/, `lib` for lib/mod.ts, or a top folder. */
export function partOf(path: string): string {
  const [top, second, third] = path.split("/");
  return top === "lib" && third !== undefined ? `lib/${second}` : top ?? "";
}

/** Every import that runs against the arrows, one line each. */
export function findForbiddenArrows(files: readonly SourceFile[]): string[] {
  const findings: string[] = [];
  for (const { path, imports } of files) {
    const from = partOf(path);
    const allowed = MAY_IMPORT[from];
    if (allowed === undefined) {
      findings.push(
        `${path}:1: ${from} is not a floor of the house; see tools/structure/arrows.ts`,
      );
      continue;
    }
    for (const { specifier, target, line } of imports) {
      // Data has no arrows: a schema or the version may be read from where it is kept.
      if (target?.endsWith(".json")) continue;
      const reason = target === undefined
        ? refusePackage(path, from, specifier)
        : refuseTarget(from, allowed, partOf(target));
      if (reason) findings.push(`${path}:${line}: imports "${specifier}", but ${reason}`);
    }
  }
  return findings;
}

function refuseTarget(from: string, allowed: readonly string[], to: string): string | undefined {
  if (to === from || allowed.includes(to)) return undefined;
  return `${from} may import ${allowed.length > 0 ? allowed.join(", ") : "only itself"}`;
}

function refusePackage(path: string, from: string, specifier: string): string | undefined {
  if (specifier.startsWith("node:")) {
    if (from.startsWith("lib")) return "lib must not touch the machine";
    if (specifier.startsWith("node:assert") && path !== "tests/assert.ts") {
      return "only tests/assert.ts may; use its assertions";
    }
    return undefined;
  }
  if (/^[a-z]+:/.test(specifier)) return "packages are imported by their name in deno.json";
  const name = specifier.split("/").slice(0, specifier.startsWith("@") ? 2 : 1).join("/");
  const parts = PACKAGE_PARTS[name];
  if (parts === undefined || parts.includes(from)) return undefined;
  return `${name} belongs to ${parts.join(", ")}`;
}
