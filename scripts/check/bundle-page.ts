import type { Step, VerifyReport } from "@/lib/core/verify/report";

const WORD: Record<Step["state"], string> = { "in-order": "in order", "not-in-order": "NOT IN ORDER", "not-checked": "not checked" };

function stepLines({ state, title, sentence, faults }: Step): string[] {
  return [
    `${WORD[state]}: ${title}. ${sentence}`,
    ...faults.flatMap((fault) => [
      `    ${fault.place}: ${fault.sentence}`,
      ...(fault.expected === undefined ? [] : [`        expected ${fault.expected}`]),
      ...(fault.found === undefined ? [] : [`        found    ${fault.found}`]),
    ]),
  ];
}

/** The page for people; ends with a line end. */
export function bundlePage(report: VerifyReport): string {
  const { facts } = report;
  const keys = [["log key", facts.logKey], ["seal key", facts.sealKey]].flatMap(([name, key]) => (key ? [`fingerprint of the ${name}  ${key}`] : []));
  const heads = facts.heads.map(({ drive, seq, hash }) => `log of drive ${drive} ends with entry ${seq}  ${hash}`);
  return [...report.steps.flatMap(stepLines), "", ...keys, ...heads, report.sentence, ""].join("\n");
}
