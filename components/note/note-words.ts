import type { WaitingFor } from "@/lib/core/words";
import type { HoldView } from "@/lib/views";

export const WAITING_WORDS: Record<WaitingFor, string> = {
  customer: "the customer", donor: "a donor board", parts: "parts", workshop: "the workshop", other: "something else",
};

export const waitsText = ({ waitingFor }: HoldView) => `On hold, waiting for ${WAITING_WORDS[waitingFor]}`;

/** "2 days later" */
export function lateText(hours: number): string {
  const days = Math.floor(hours / 24);
  return days > 0 ? `${days} ${days === 1 ? "day" : "days"} later` : `${hours} h later`;
}
