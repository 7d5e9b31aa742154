/** Folder that holds deno.json. */
export function projectRoot(): string {
  return decodeURIComponent(new URL("..", import.meta.url).pathname).replace(/\/$/, "");
}

/** Prints what a check found, `file:line: what is wrong` each, and ends the process with its status. */
export function finish(findings: readonly string[]): never {
  for (const finding of findings) console.error(finding);
  Deno.exit(findings.length === 0 ? 0 : 1);
}
