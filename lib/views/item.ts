import type { ItemType } from "@/lib/core/words";
import type { PersonView } from "./person";

export interface HandOverView {
  id: string;
  from: { person: string; place: string };
  to: { person: string; place: string };
  /** the receiver's account; they confirm themselves */
  toUserId: string | null;
  condition: string;
  sealNumber: string | null;
  note: string | null;
  givenBy: PersonView;
  givenAt: string;
  confirmed: { received: boolean; by: PersonView; at: string; text: string | null } | null;
}

/** A drive, board or lifted chip: where it is by the last confirmed hand-over, and the one that waits. */
export interface ItemView {
  type: ItemType;
  id: string;
  name: string;
  at: HandOverView | null;
  open: HandOverView | null;
  /** how many hand-overs there were */
  past: number;
}

export interface PlacedItem {
  driveId: string;
  item: string;
  handOver: HandOverView;
}
