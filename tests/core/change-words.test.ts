import { expect, it } from "vitest";
import { describe as told } from "@/lib/core/custody-actions";

const ID = "00000000-0000-4000-8000-000000000001";
const shelf = (change: { field: string; from: string | null; to: string | null }) => told("shelf.changed", { shelfBoard: ID, number: "D-0010", changes: [change], reason: null }).sentence;

it("what a customer's own fact was changed to is not said twice", () => {
  const { sentence } = told("case.corrected", { caseRef: "26-0042", changes: [{ field: "customer's phone", from: "(not in the log)", to: "(not in the log)" }], reason: "Mistyped" });
  expect(sentence).toBe("Corrected case 26-0042: customer's phone (not in the log). Reason: Mistyped");
});

it("a board of the shelf is taken or reserved for something, never from nothing", () => {
  expect(shelf({ field: "taken for", from: null, to: "Drive A of case 26-0019" })).toBe("Changed D-0010 on the donor shelf: taken for Drive A of case 26-0019");
  expect(shelf({ field: "reserved for", from: "26-0042", to: null })).toBe("Changed D-0010 on the donor shelf: no longer reserved for 26-0042");
  expect(shelf({ field: "reserved for", from: "26-0042", to: "26-0043" })).toBe("Changed D-0010 on the donor shelf: reserved for 26-0043, no longer 26-0042");
  expect(shelf({ field: "origin", from: null, to: "Bought singly" })).toBe("Changed D-0010 on the donor shelf: origin from nothing to Bought singly");
});
