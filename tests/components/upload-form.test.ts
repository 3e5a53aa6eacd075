import { describe, expect, it } from "vitest";
import { agreeingOrder } from "@/components/chip/agreement-matrix";
import { supplyWarning } from "@/components/chip/upload-form";
import { uploadForm } from "@/components/chip/upload-rules";
import { sizeQuestion } from "@/components/chip/will-equal";

describe("the upload form", () => {
  it("refuses an upload whose supply nobody stated", () => {
    const answer = uploadForm.safeParse({ stage: "before", seating: "1", reader: "R2", method: "", toolVersion: "", adapter: "", clockKilohertz: "", controllerHeld: "", note: "", supplyMillivolts: "" });
    expect(answer.error?.issues.map((i) => i.path.join())).toEqual(["supplyMillivolts"]);
  });

  it("warns before 3.3 V reach a 1.8 V chip", () => {
    expect(supplyWarning("3300", 1800, "U3")).toBe("U3 is a 1.8 V chip: 3.3 V destroys it. Set the reader to 1.8 V.");
    expect(supplyWarning("1800", 1800, "U3")).toBeNull();
    expect(supplyWarning("unknown", 3300, "U3")).toContain("Look the supply up");
  });

  it("says what becomes of a file of another size", () => {
    expect(sizeQuestion(262_144, 524_288)).toContain("256 KiB is half of this chip’s 512 KiB");
    expect(sizeQuestion(0, 524_288)).toContain("empty");
  });
});

describe("the agreement matrix", () => {
  it("puts agreeing reads together from five reads on", () => {
    const same = ["a", "b", "a", "a", "c", "a"];
    const matrix = { reads: same.map((_, i) => ({ number: i + 1, name: `Read ${i + 1}` })), cells: same.map((x, i) => same.map((y, k) => (i === k ? null : x === y ? 0 : 9))) };
    expect(agreeingOrder(matrix)).toEqual([0, 2, 3, 5, 1, 4]);
  });
});
