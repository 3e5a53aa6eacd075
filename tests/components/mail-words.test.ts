import { expect, it } from "vitest";
import { mailState } from "@/components/outbox/mail-words";

it("a mail that may have arrived twice never passes for one that was sent once", () => {
  expect(mailState({ state: "sent", attempts: 1, possibleDuplicate: false })).toEqual({ mark: "done", words: "Sent", twice: false });
  expect(mailState({ state: "sent", attempts: 2, possibleDuplicate: true })).toEqual({ mark: "caution", words: "Sent, 2 tries, possible duplicate", twice: true });
});

it("a mail that is still tried or given up says so first, whatever an earlier try left open", () => {
  expect(mailState({ state: "queued", attempts: 2, possibleDuplicate: true })).toEqual({ mark: "wait", words: "Waiting to be sent, 2 tries", twice: false });
  expect(mailState({ state: "dead", attempts: 1, possibleDuplicate: true })).toEqual({ mark: "block", words: "Given up, 1 try", twice: false });
});
