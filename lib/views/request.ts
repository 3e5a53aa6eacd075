import type { AskedDrive } from "@/lib/core/drive-from-request";
import type { RequestState } from "@/lib/core/request-state";
import type { AsSent } from "@/lib/core/words";
import type { RequestAnswers } from "@/lib/schemas/request";
import type { PersonView } from "./person";

/** The parcel as it came. */
export interface ReceiptView {
  carrier: string | null;
  tracking: string | null;
  sealAsSent: AsSent;
  sealNumber: string | null;
  smallBoard: AsSent;
  parcelCondition: string;
  accessories: string | null;
  /** what is not as the request said; null when all is */
  differs: string | null;
  by: PersonView;
  at: string;
}

/** A case that was asked for and whose parcel is not here yet. */
export interface ToReceiveRow {
  caseId: string;
  caseRef: string;
  customerName: string;
  damage: string;
  dueOn: string | null;
  /** the day by which the customer needs it, as they typed it */
  neededBy: string | null;
  /** part number, model or serial number, as the customer gave it */
  partNumber: string | null;
  requestedAt: string;
}

/** What the customer said would be in the parcel. */
export interface ParcelView {
  caseId: string;
  caseRef: string;
  refChecked: string;
  customerName: string;
  damage: string;
  note: string | null;
  requestedAt: string | null;
  receivedAt: string | null;
  closed: boolean;
  asked: AskedDrive;
  /** a word of lib/core/request-words.ts; null for a case made at the desk */
  enclosure: string | null;
  boardHidden: boolean;
  dueOn: string | null;
  /** the day by which the customer needs it, as they typed it */
  neededBy: string | null;
}

/** The customer's private page. */
export interface RequestPageView {
  workshop: string;
  /** lines of the workshop's address; may be empty */
  address: string[];
  hours: string | null;
  contact: { email: string | null; phone: string | null };
  refChecked: string;
  state: RequestState;
  answers: RequestAnswers;
  /** how many the customer sent */
  photos: number;
  requestedAt: string;
  receivedAt: string | null;
  /** the slip is still of use */
  slip: boolean;
  /** the request can still be taken back */
  withdraws: boolean;
  deletion: { askedAt: string; answerBy: string; answered: { at: string; answer: string | null } | null } | null;
  /** when the images were erased */
  erasedAt: string | null;
  summarySentAt: string | null;
  /** when this page ends, once that is known */
  ends: string | null;
}

/** The page that travels with the board. */
export interface RequestSlipView {
  workshop: string;
  address: string[];
  hours: string | null;
  refChecked: string;
  answers: RequestAnswers;
}

/** A request as the desk sees it on its case. */
export interface RequestSectionView {
  id: string;
  answers: RequestAnswers;
  requestedAt: string;
  /** the sentence that the customer's page shows */
  shown: string;
  closed: boolean;
  link: { ends: string | null; works: boolean };
  deletion: { askedAt: string; answerBy: string; daysLeft: number; message: string | null; answered: { at: string; by: string; answer: string | null } | null } | null;
}
