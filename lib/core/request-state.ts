import type { ChipStateCode, ClosedKind, WaitingFor } from "./words";

/** What the customer's page knows of a case. Times are RFC 3339. */
export interface RequestFacts {
  requestedAt: string;
  receivedAt: string | null;
  hold: { waitingFor: WaitingFor | null; since: string | null; reason: string } | null;
  /** an original's main controller holds the data itself: there is no chip to move */
  noChip: boolean;
  /** states of the chips that belong to the transfer */
  chips: readonly ChipStateCode[];
  returnedAt: string | null;
  closedAt: string | null;
  closedKind: ClosedKind | null;
}

export type RequestStep = "requested" | "received" | "reading" | "checking" | "writing" | "reading-back" | "ready" | "waiting" | "question" | "no-chip" | "returned" | "closed" | "withdrawn";

export interface RequestState {
  step: RequestStep;
  /** one plain sentence: how it stands */
  title: string;
  /** what comes next, or what the customer can do */
  next: string;
  /** since when, where that says something */
  since: string | null;
  /** what the workshop asks, as it was written down for the customer */
  question: string | null;
}

const of = (step: RequestStep, title: string, next: string, since: string | null = null, question: string | null = null): RequestState => ({ step, title, next, since, question });

const WAITING: Record<Exclude<WaitingFor, "customer">, [title: string, next: string]> = {
  donor: ["We are looking for a donor board that fits.", "As soon as one is here we go on. You need to do nothing."],
  parts: ["We wait for parts.", "As soon as they are here we go on. You need to do nothing."],
  workshop: ["Your case is resting for a while.", "We go on with it ourselves. You need to do nothing."],
  other: ["Your case is resting for a while.", "We go on with it ourselves. You need to do nothing."],
};

/** How far along a chip is; the case is as far as the chip that is least far. */
const ORDER: readonly ChipStateCode[] = ["unread", "needs-reads", "reads-disagree", "held", "ready", "approved", "failed", "written", "verified"];

/** The case's state as the customer reads it: what is so, and what comes next. Nothing in it names a person or another case. */
export function requestState(f: RequestFacts): RequestState {
  if (f.closedAt) return ended(f);
  if (f.returnedAt) return of("returned", "Your drive is on its way back to you.", "When it has arrived, keep it switched off until you have read the summary.", f.returnedAt);
  if (f.hold && f.hold.waitingFor === "customer") {
    return of("question", "We have a question for you.", "Answer by mail or telephone and name your case number. We go on as soon as we know.", f.hold.since, f.hold.reason);
  }
  if (!f.receivedAt) return of("requested", "Your request is with us. Your parcel isn’t here yet.", "Print the slip, pack as it says, and send the parcel.", f.requestedAt);
  if (f.hold) return of("waiting", ...WAITING[f.hold.waitingFor === "customer" ? "other" : f.hold.waitingFor ?? "other"], f.hold.since);
  if (f.noChip && f.chips.length === 0) {
    return of("no-chip", "This drive has no chip that could be moved.", "Its data sits inside the main controller. We write to you about what can be done instead.", f.receivedAt);
  }
  if (f.chips.length === 0) return of("received", "We have your parcel.", "Next we look at drive and board and find the memory chips.", f.receivedAt);
  return atTheBench(ORDER[Math.min(...f.chips.map((state) => ORDER.indexOf(state)))], f);
}

function atTheBench(least: ChipStateCode, f: RequestFacts): RequestState {
  const [chip, image] = f.chips.length === 1 ? ["chip", "image"] : ["chips", "images"];
  switch (least) {
    case "ready":
      return of("checking", `We have read the ${chip} of your board.`, `Next a lead technician looks at what was read and clears the ${image} for writing.`);
    case "approved":
      return of("writing", `What we read is cleared for writing.`, `Next the ${image} ${f.chips.length === 1 ? "goes" : "go"} to the donor board.`);
    case "failed":
    case "written":
      return of("reading-back", "The donor board has been written to.", "Next we read it back until we know that it holds exactly what we read from your board.");
    case "verified":
      return of("ready", "Your drive is ready to go back.", "What the donor board holds equals what we read from your board, byte for byte. We test the drive, then send it.");
    default:
      return of("reading", `We are reading the ${chip} of your board.`, "We read several times, until the reads agree. Nothing is written to your board.", f.receivedAt);
  }
}

function ended(f: RequestFacts): RequestState {
  if (f.closedKind === "cancelled" && !f.receivedAt) return of("withdrawn", "You have withdrawn this request.", "Please don’t send a parcel. A new request gets a new number.", f.closedAt);
  if (f.closedKind === "cancelled") return of("closed", "This case was cancelled.", "Ask us if you don’t know why.", f.closedAt);
  if (f.closedKind === "without-transfer") return of("closed", "This case is closed. No chip was transferred.", "Ask us if you don’t know why.", f.closedAt);
  return of("returned", "Your drive has gone back to you, and the case is closed.", "Keep the mail with the summary: it says what was done.", f.returnedAt ?? f.closedAt);
}
