import { InputError, type Problem } from "../kernel/sheet/problem.ts";
import { perhaps } from "../kernel/sheet/_nearest.ts";
import type { RevisionFile } from "../kernel/sheet/revision.ts";
import type { ReportSection, Waiver } from "./report_data.ts";

/**
 * Marks as waived what the lead lets pass. A waiver holds up to and including its last day, counted
 * against the review date; past it the verdict keeps its state and says so in its note.
 *
 * @throws {InputError} when a waiver names a verdict that its template did not give
 */
export function applyWaivers(
  sections: readonly ReportSection[],
  file: RevisionFile,
): readonly ReportSection[] {
  const { waivers, reviewDate } = file.revision;
  const problems = unmatched(sections, file);
  if (problems.length > 0) throw new InputError(problems);
  return sections.map((section) => ({
    ...section,
    verdicts: section.verdicts.map((verdict) => {
      const waiver = waivers.find((one) =>
        one.template === section.template && one.verdict === verdict.name
      );
      const failed = verdict.state === "missed" || verdict.state === "not run";
      if (waiver === undefined || !failed) return verdict;
      if (holds(waiver, reviewDate)) return { ...verdict, state: "waived" as const };
      const note = `the waiver by ${waiver.by} ended on ${waiver.expires}`;
      return {
        ...verdict,
        note: verdict.note === undefined ? note : `${verdict.note}; ${note}`,
      };
    }),
  }));
}

/** True up to and including the waiver's last day. ISO dates sort as texts. */
export function holds(waiver: Waiver, reviewDate: string): boolean {
  return reviewDate <= waiver.expires;
}

function unmatched(sections: readonly ReportSection[], file: RevisionFile): Problem[] {
  return file.revision.waivers.flatMap((waiver, i) => {
    const section = sections.find(({ template }) => template === waiver.template);
    const names = section?.verdicts.map(({ name }) => name) ?? [];
    if (names.includes(waiver.verdict)) return [];
    const hint = perhaps(waiver.verdict, names) ||
      (names.length === 0 ? "" : `; it gives ${names.map((name) => `"${name}"`).join(", ")}`);
    return [file.problemAt(
      ["waivers", i, "verdict"],
      `waivers: ${waiver.template} gives no verdict "${waiver.verdict}"${hint}`,
    )];
  });
}
