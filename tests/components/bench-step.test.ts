import { describe, expect, it } from "vitest";
import { stepAndReason } from "@/components/bench/bench-words";

describe("what to do and why, on the bench", () => {
  it.each([
    ["Read 2 differs in 214 bytes, all in 0x1F000–0x1FFFF: looks like lost contact. Re-seat the clip and read again.", "Re-seat the clip and read again.", "Read 2 differs in 214 bytes, all in 0x1F000–0x1FFFF: looks like lost contact."],
    ["1 of 3 reads, 1 of 2 seatings: read again in a new seating.", "Read again in a new seating.", "1 of 3 reads, 1 of 2 seatings."],
    ["Read 1: All FF. The chip wasn't powered or the clip isn't on. Check pin 8 and read again. A plausible chip id with the same result says it is truly blank.", "Check pin 8 and read again.", "Read 1: All FF. The chip wasn't powered or the clip isn't on. A plausible chip id with the same result says it is truly blank."],
    ["Both read-backs equal the approved image in all 8,192 bytes. Fit the donor board to the drive and test its start-up.", "Fit the donor board to the drive and test its start-up.", "Both read-backs equal the approved image in all 8,192 bytes."],
    ["Both read-backs equal the approved image in all 8,192 bytes. Pack the donor board with the drive.", "Pack the donor board with the drive.", "Both read-backs equal the approved image in all 8,192 bytes."],
  ])("parts “%s”", (sentence, step, reason) => {
    expect(stepAndReason(sentence)).toEqual({ step, reason });
  });

  it("takes the last sentence when none starts with a step, and a lone one whole", () => {
    expect(stepAndReason("Something was found. The lead decides.")).toEqual({ step: "The lead decides.", reason: "Something was found." });
    expect(stepAndReason("Not paired yet.")).toEqual({ step: "Not paired yet.", reason: null });
  });
});
