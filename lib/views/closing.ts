import type { ClosingFacts } from "@/lib/core/closing";
import type { StartUpFacts } from "@/lib/core/start-up";
import type { ClosedKind } from "@/lib/core/words";
import type { PersonView } from "./person";

export interface ReturnView {
  items: string[];
  toPerson: string;
  carrier: string | null;
  tracking: string | null;
  sealNumber: string | null;
  note: string | null;
  by: PersonView;
  at: string;
}

/** The end of a case: tests, what goes back, how it was closed. */
export interface ClosingView {
  facts: ClosingFacts;
  /** the latest test of each drive, and why it may not be started yet */
  drives: { id: string; letter: string; test: StartUpFacts | null; refusal: string | null; /** its own data lies inside the main controller */ noChip: boolean; /** its chips are kept for reference, none is to be transferred */ onlyKept: boolean }[];
  /** what could go back */
  items: string[];
  customerName: string;
  returned: ReturnView | null;
  closed: { at: string; kind: ClosedKind | null; reason: string | null } | null;
  /** calendar day of the workshop; set when the case is closed */
  eraseOn: string | null;
  /** how many days images are kept after the return, as the customer was told */
  keepDays: number;
}
