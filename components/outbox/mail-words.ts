import type { MarkKind } from "@/components/ui/mark";
import type { MailView } from "@/lib/views";

const STATE: Record<MailView["state"], { mark: MarkKind; word: string }> = {
  queued: { mark: "wait", word: "Waiting to be sent" }, sending: { mark: "run", word: "Being sent" }, sent: { mark: "done", word: "Sent" }, dead: { mark: "block", word: "Given up" },
};

/** How far a mail is; one that may have arrived twice never passes for one that was sent once. */
export function mailState({ state, attempts, possibleDuplicate }: Pick<MailView, "state" | "attempts" | "possibleDuplicate">): { mark: MarkKind; words: string; twice: boolean } {
  const twice = possibleDuplicate && state === "sent";
  const tries = attempts > 1 || state === "dead" ? [attempts === 1 ? "1 try" : `${attempts} tries`] : [];
  return { mark: twice ? "caution" : STATE[state].mark, words: [STATE[state].word, ...tries, ...(twice ? ["possible duplicate"] : [])].join(", "), twice };
}
