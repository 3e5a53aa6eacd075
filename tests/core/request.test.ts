import { describe, expect, it } from "vitest";
import { addressGroup } from "@/lib/core/address-group";
import { checkCharacter, withCheck } from "@/lib/core/case-number";
import { likelyEmail, lookAlikeHint } from "@/lib/core/look-alikes";
import { type RequestFacts, requestState } from "@/lib/core/request-state";
import { CHIP_STATES, WAITING_FOR } from "@/lib/core/words";
import { requestAnswers } from "@/lib/schemas/request";
import { answers } from "../support/request";

const facts = (change: Partial<RequestFacts> = {}): RequestFacts => ({
  requestedAt: "2026-03-06T09:00:00Z", receivedAt: "2026-03-09T10:00:00Z", hold: null, noChip: false, chips: [], returnedAt: null, closedAt: null, closedKind: null, ...change,
});
const titleOf = (change: Partial<RequestFacts>) => requestState(facts(change)).title;

describe("a case in the customer's words", () => {
  it("goes from the request to the return", () => {
    expect([
      titleOf({ receivedAt: null }), titleOf({}), titleOf({ chips: ["unread"] }), titleOf({ chips: ["ready"] }), titleOf({ chips: ["approved"] }),
      titleOf({ chips: ["written"] }), titleOf({ chips: ["verified"] }), titleOf({ chips: ["verified"], returnedAt: "2026-04-01T08:00:00Z" }),
    ]).toEqual([
      "Your request is with us. Your parcel isn’t here yet.", "We have your parcel.", "We are reading the chip of your board.", "We have read the chip of your board.", "What we read is cleared for writing.",
      "The donor board has been written to.", "Your drive is ready to go back.", "Your drive is on its way back to you.",
    ]);
  });

  it("is as far as the chip that is least far", () => {
    expect(requestState(facts({ chips: ["verified", "unread"] })).step).toBe("reading");
    expect(requestState(facts({ chips: ["verified", "failed"] })).step).toBe("reading-back");
    expect(requestState(facts({ chips: ["verified", "verified"] })).step).toBe("ready");
  });

  it("has words for each state of a chip, and never the bench's own", () => {
    for (const state of CHIP_STATES) {
      const { title, next } = requestState(facts({ chips: [state] }));
      expect(`${title} ${next}`).not.toMatch(/seating|held|disagree|finding|approval|failed|undefined/i);
    }
  });

  it("asks the customer's question only when the customer is waited for", () => {
    const reason = "Which of the two drives holds the accounts?";
    for (const waitingFor of WAITING_FOR) {
      const state = requestState(facts({ hold: { waitingFor, since: "2026-03-10T09:00:00Z", reason } }));
      if (waitingFor === "customer") expect(state).toMatchObject({ step: "question", question: reason });
      else expect(JSON.stringify(state)).not.toContain(reason);
    }
    expect(requestState(facts({ receivedAt: null, hold: { waitingFor: "customer", since: null, reason } })).step).toBe("question");
  });

  it("says how it ended", () => {
    const closedAt = "2026-04-02T08:00:00Z";
    expect(titleOf({ receivedAt: null, closedAt, closedKind: "cancelled" })).toBe("You have withdrawn this request.");
    expect(titleOf({ closedAt, closedKind: "cancelled" })).toBe("This case was cancelled.");
    expect(titleOf({ closedAt, closedKind: "without-transfer" })).toBe("This case is closed. No chip was transferred.");
    expect(titleOf({ closedAt, closedKind: "returned" })).toBe("Your drive has gone back to you, and the case is closed.");
    expect(titleOf({ noChip: true })).toBe("This drive has no chip that could be moved.");
  });
});

describe("the case number on the slip", () => {
  // ISO/IEC 7064 MOD 37,36, computed by an independent program from the standard's own description
  it("carries the check character of the design's own example", () => expect(withCheck("26-0183")).toBe("26-0183.4"));
  it("tells every single mistyped place", () => {
    for (let i = 0; i < 6; i += 1) {
      for (const digit of "0123456789") {
        const digits = [..."260183"];
        if (digits[i] === digit) continue;
        digits[i] = digit;
        expect(checkCharacter(digits.join(""))).not.toBe("4");
      }
    }
  });
});

describe("hints", () => {
  it("point at look-alikes and refuse nothing", () => {
    expect(lookAlikeHint("PN 4471-0093-8")).toBe("0 is a zero with a stroke, O is the letter. Look twice at 8 and B.");
    expect(lookAlikeHint("PN 4477-3")).toBeNull();
    expect(requestAnswers.safeParse(answers({ partNumber: "PN 4471-0093-8" })).success).toBe(true);
  });

  it("name a likely address only where one comes to mind", () => {
    expect(likelyEmail("edda.finch@harrowfinch,example")).toBe("edda.finch@harrowfinch.example");
    expect(likelyEmail(" mailto:edda@finch.example ")).toBe("edda@finch.example");
    expect(likelyEmail("edda@finch.example")).toBeNull();
    expect(likelyEmail("edda at home")).toBeNull();
  });
});

describe("an address that requests are counted under", () => {
  it.each([
    ["203.0.113.9", "203.0.113.9"], ["::ffff:203.0.113.9", "203.0.113.9"],
    ["2001:db8:1:2:3:4:5:6", "2001:db8:1:2::/64"], ["2001:db8:1:2::9", "2001:db8:1:2::/64"], ["2001:DB8:0001:0002::", "2001:db8:1:2::/64"], ["fe80::1%eth0", "fe80:0:0:0::/64"],
    ["unknown", "unknown"], ["1::2::3", "1::2::3"],
  ])("%s is %s", (address, group) => expect(addressGroup(address)).toBe(group));
});

describe("what is refused in an answer", () => {
  const refused = (change: Record<string, unknown>) => {
    const result = requestAnswers.safeParse(answers(change));
    return result.success ? [] : [...new Set(result.error.issues.map((issue) => issue.path.join(".")))];
  };
  it("names every field that is open, all at once", () => {
    const result = requestAnswers.safeParse({});
    const paths = result.success ? [] : result.error.issues.map((issue) => issue.path.join("."));
    expect(paths).toEqual(expect.arrayContaining(["name", "email", "returnAddress", "partNumber", "boardNumber", "damage", "enclosure", "lock", "importance", "consentOwner", "consentRead", "consentWrite", "consentSolder", "signature"]));
  });
  it("takes a drive by any one of its numbers, and a board that can't be seen", () => {
    expect(refused({ partNumber: "", serial: "S1" })).toEqual([]);
    expect(refused({ partNumber: "", serial: "", model: "M" })).toEqual([]);
    expect(refused({ partNumber: " ", serial: "", model: "" })).toEqual(["partNumber"]);
    expect(refused({ boardNumber: "", boardHidden: "yes" })).toEqual([]);
    expect(refused({ boardNumber: "", boardHidden: "" })).toEqual(["boardNumber"]);
  });
  it.each([
    ["a line break", "Edda\r\nBcc: all@victims.example"], ["NUL", "Edda\0Finch"], ["an escape", "Edda\u001b[31m"], ["a turned direction", "Edda \u202ehcniF"],
    ["an isolate", "\u2066Edda"], ["a line separator", "Edda\u2028Finch"], ["half a character", "Edda \ud800"], ["4 KB", "x".repeat(4096)],
  ])("a name with %s", (_, name) => expect(refused({ name })).toEqual(["name"]));
  it("takes letters of every script", () => {
    for (const name of ["אדה פינץ׳", "عدّة فنش", "Łucja Żółć", "李小龍", "O'Finch <i>"]) expect(refused({ name })).toEqual([]);
  });
  it("an unticked line, a damage of its own, a day that isn't, an unknown field", () => {
    expect(refused({ consentSolder: "" })).toEqual(["consentSolder"]);
    expect(refused({ damage: "magic" })).toEqual(["damage"]);
    expect(refused({ neededBy: "next week" })).toEqual(["neededBy"]);
    expect(refused({ role: "admin" })).toEqual([""]);
  });
});
