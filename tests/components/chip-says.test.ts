import { describe, expect, it } from "vitest";
import { idSays, sfdpSays } from "@/components/drive/chip-says";

/** Header, one table of 16 words at 0x10, and in it the size: 4 Mbit as bits minus one. */
const SFDP = `53464450 06010 0ff 00 06 01 10 10 00 00 ff ${"e5 20 f1 ff"} ff ff 3f 00`.replace("06010 0ff", "060100ff");

describe("what the chip says of itself", () => {
  it("proposes a size from an id, and none from one that no chip gave", () => {
    expect(idSays("EF 40 13")).toMatchObject({ kind: "ok", proposal: { bytes: 524_288, source: "id" } });
    expect(idSays("ff ff ff")).toMatchObject({ kind: "caution", proposal: null });
    expect(idSays("ff ff ff")?.sentence).toContain("didn't answer");
    expect(idSays("EF 4")).toMatchObject({ kind: "wait", proposal: null });
    expect(idSays(" ")).toBeNull();
  });

  it("proposes the size of the chip's own table, and says when there is none in the dump", () => {
    expect(sfdpSays(SFDP)).toMatchObject({ kind: "ok", proposal: { bytes: 524_288, source: "sfdp" } });
    expect(sfdpSays("ff".repeat(32))).toMatchObject({ kind: "caution", proposal: null });
    expect(sfdpSays("5346 4")).toMatchObject({ kind: "wait" });
    expect(sfdpSays("")).toBeNull();
  });
});
