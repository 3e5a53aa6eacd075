import type { MarkKind } from "@/components/ui/mark";
import type { StartUpFacts } from "@/lib/core/start-up";

/** Shape and colour of a test's outcome; its words stand beside it. */
export function startUpMark({ ready, serialMatches }: Pick<StartUpFacts, "ready" | "serialMatches">): MarkKind {
  if (serialMatches === false) return "block";
  return ready ? "ok" : "caution";
}

export function serialText({ reportedSerial, serialMatches }: Pick<StartUpFacts, "reportedSerial" | "serialMatches">): string {
  if (serialMatches === null) return reportedSerial ? "No serial of the label is recorded to compare it with" : "None reported";
  return serialMatches ? "Equals the label" : "Another than the label’s";
}
