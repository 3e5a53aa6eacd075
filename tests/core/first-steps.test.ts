import { expect, it } from "vitest";
import { firstSteps, type HouseFacts } from "@/lib/core/first-steps";

const house = (over: Partial<HouseFacts> = {}): HouseFacts => ({ leads: 1, technicians: 1, twoPersonRule: true, mailLeaves: true, missing: [], ...over });

it.each([
  ["nobody could approve", house({ leads: 0, technicians: 3 }), ["nobody-approves"]],
  ["the only one at the bench could never approve", house({ technicians: 0 }), ["one-person"]],
  ["one works alone and has said so", house({ technicians: 0, twoPersonRule: false }), []],
  ["two leads read for each other", house({ leads: 2, technicians: 0 }), []],
  ["mail reaches nobody, and papers have no address", house({ mailLeaves: false, missing: ["WORKSHOP_ADDRESS"] }), ["mail", "settings"]],
  ["nothing is there yet", house({ leads: 0, technicians: 0, mailLeaves: false, missing: ["WORKSHOP_NAME"] }), ["nobody-approves", "mail", "settings"]],
  ["all is there", house(), []],
])("names what a workshop lacks: %s", (_, given, steps) => {
  expect(firstSteps(given)).toEqual(steps);
});
