import { describe, expect, it } from "vitest";
import { FINDING_GROUPS, helpOf } from "@/components/help/finding-help";
import { findingExamples } from "@/components/help/finding-examples";
import type { DiagnosisCode } from "@/lib/core/diagnose-cause";
import { LOOKS_LIKE } from "@/lib/core/diagnose-sentences";
import { FINDING_CODES, type Severity } from "@/lib/core/words";

/** Everything the engine can say: the findings, and the three words of a comparison that are none. */
const CODES: DiagnosisCode[] = [...FINDING_CODES, "equal", "different-length", "unclassified"];
const inHelp = FINDING_GROUPS.flatMap((group) => Object.keys(group.findings) as DiagnosisCode[]);

describe("the findings page", () => {
  it("explains every code of the engine, each once, and none that there is not", () => {
    expect([...inHelp].sort()).toEqual([...CODES].sort());
  });

  it.each(CODES)("shows the engine's own sentence for %s, in each severity that the page names", (code) => {
    const said = findingExamples().get(code) ?? [];
    expect(said.length, "no example gives this code").toBeGreaterThan(0);
    for (const { message, advice } of said) {
      expect(message).toMatch(/\.$/);
      expect(advice).toMatch(/\.$/);
    }
    const help = helpOf(code)!;
    const own = said.map((one) => one.severity).filter((one): one is Severity => one !== null);
    // a code of two groups is judged here where it has a severity of its own
    if (Object.keys(help.severity).length > 0) expect([...own].sort()).toEqual(Object.keys(help.severity).sort());
  });

  it("has a name for everything that a difference can look like", () => {
    for (const code of Object.keys(LOOKS_LIKE) as DiagnosisCode[]) expect(helpOf(code)?.title, code).toBeTruthy();
  });

  it("says in plain sentences what it means and what to do", () => {
    for (const code of inHelp) {
      const { title, rule, means, bench } = helpOf(code)!;
      expect(title, code).toMatch(/^[A-Z][^.]*$/);
      for (const text of [rule, means, ...bench]) expect(text, code).toMatch(/^[A-Z“].*\.|^[A-Z“].*\?$/);
      expect(bench.length, code).toBeGreaterThan(0);
      expect(`${title} ${rule} ${means} ${bench.join(" ")}`, code).not.toMatch(/\b(failed|invalid|success|oops|please)\b|!/i);
    }
  });
});
