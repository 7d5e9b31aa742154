/** Outcome of a run of `deno test`. */
export interface TestSummary {
  readonly passed: number;
  readonly failed: number;
  readonly skipped: number;
  /** "3 passed, 0 failed", with ", 1 skipped" where any were. */
  readonly line: string;
  /** Exit status: 0 only when tests ran and none failed. */
  readonly status: number;
}

const SUMMARY =
  /^(?:ok|FAILED) \| (\d+) passed(?: \(\d+ steps?\))? \| (\d+) failed(?: \(\d+ steps?\))?(?: \| (\d+) ignored(?: \(\d+ steps?\))?)?.*$/gm;

/**
 * Reads the last summary line of `deno test` from what it printed.
 *
 * @param output uncoloured standard output of the run
 * @param code exit status of the run; a file that cannot be loaded gives a status but no summary line
 */
export function lastSummary(output: string, code: number): TestSummary {
  const last = [...output.matchAll(SUMMARY)].at(-1);
  const [passed, counted, skipped] = [1, 2, 3].map((group) => Number(last?.[group] ?? 0)) as [
    number,
    number,
    number,
  ];
  const ranNone = passed + counted === 0;
  const failed = counted === 0 && (code !== 0 || ranNone) ? 1 : counted;
  return {
    passed,
    failed,
    skipped,
    line: `${passed} passed, ${failed} failed${skipped > 0 ? `, ${skipped} skipped` : ""}`,
    status: failed > 0 ? code || 1 : 0,
  };
}
