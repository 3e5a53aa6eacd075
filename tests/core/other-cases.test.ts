import { expect, it } from "vitest";
import { refsIn, withoutRefs } from "@/lib/core/other-cases";

const hide = (text: string, ...refs: string[]) => withoutRefs({ message: text }, new Set(refs)).message;

it("leaves a case number out of a sentence, with its check character too", () => {
  expect(hide("Equals Read 1 of U12, case 26-0003, another drive.", "26-0003")).toBe("Equals Read 1 of U12, case [another case], another drive.");
  expect(hide("It belongs to 26-0003.X or 26-0004.", "26-0003", "26-0004")).toBe("It belongs to [another case] or [another case].");
  expect(hide("Case 26-12345 and 26-0007", "26-12345")).toBe("Case [another case] and 26-0007");
});

it("takes no part of a longer number or name for one", () => {
  for (const text of ["BX 126-0003", "26-00031", "26-0003-B", "PN4471-26-0003", "a26-0003", "26-000", "1.26-0003"]) {
    expect(hide(text, "26-0003"), text).toBe(text);
    expect(refsIn({ message: text })).not.toContain("26-0003");
  }
});

it("leaves typed facts, digests and the log's bodies as they are", () => {
  const view = { body: "26-0003", partNumber: "26-0003", serial: "26-0003", fileName: "26-0003.bin", ref: "26-0003", boards: [{ boardNumber: "26-0003" }] };
  expect(withoutRefs(view, new Set(["26-0003"]))).toEqual(view);
  expect(refsIn(view)).toEqual([]);
});

it("finds sentences however deep they lie, and in records of reasons", () => {
  const view = { reads: [{ findings: [{ message: "case 26-0001" }] }], approval: { reasons: { "other-drive": "see 26-0002" } }, setAside: { reason: "26-0001" }, cells: null, at: 5 };
  expect(refsIn(view)).toEqual(["26-0001", "26-0002"]);
  expect(withoutRefs(view, new Set(["26-0002"]))).toEqual({ ...view, approval: { reasons: { "other-drive": "see [another case]" } } });
});
