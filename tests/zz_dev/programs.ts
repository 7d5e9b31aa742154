/** Programs of the system that these tests drive, where they are found. */
export interface Programs {
  readonly chromium: string | undefined;
  readonly jupyterNotebook: string | undefined;
  /** A Python that has nbclient. */
  readonly python: string | undefined;
}

/** Looks for the programs. */
export function findPrograms(): Programs {
  return {
    chromium: firstOf(["chromium", "chromium-browser", "google-chrome"], ["--version"]),
    jupyterNotebook: firstOf(["jupyter-notebook"], ["--version"]),
    python: firstOf(["python3"], ["-c", "import nbclient, nbformat"]),
  };
}

/**
 * Whether a test that needs these programs is left out, which it says; never where `CI` is set, so
 * that a missing program fails there.
 */
export function isLeftOut(test: string, needed: Readonly<Record<string, string | undefined>>) {
  const missing = Object.keys(needed).filter((name) => needed[name] === undefined);
  if (missing.length === 0 || Deno.env.get("CI")) return false;
  console.log(`${test}: left out, for ${missing.join(" and ")} cannot be found`);
  return true;
}

/** The first program of these names that runs with these arguments; the system's own comes first. */
function firstOf(names: readonly string[], args: readonly string[]): string | undefined {
  for (const name of names) {
    for (const path of [`/usr/bin/${name}`, name]) {
      try {
        const command = new Deno.Command(path, { args: [...args], stdout: "null", stderr: "null" });
        if (command.outputSync().success) return path;
      } catch (error) {
        if (!(error instanceof Deno.errors.NotFound)) throw error;
      }
    }
  }
  return undefined;
}
