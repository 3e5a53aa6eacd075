import type { Printed } from "@/lib/core/paper";

export const PRINTED_WORDS: Record<Printed, { title: string; note: string }> = {
  labels: { title: "Labels", note: "For bag, drive, boards and chip trays, one to a page" },
  "job-ticket": { title: "Job ticket", note: "A5, goes with the job over the bench" },
  "read-sheet": { title: "Read sheets", note: "A4, one a chip, for a bench without a screen" },
  "write-ticket": { title: "Write ticket", note: "A6 or A5, for the programmer" },
  "return-slip": { title: "Return slip", note: "A4, lies on top in the parcel" },
  erasure: { title: "Certificate of erasure", note: "A4, after the images of a closed case were erased" },
  receipt: { title: "Receipt", note: "A5, for whoever brings it in person" },
};

export interface PrintLink {
  href: string;
  label: string;
}

/** Address of something printed; `of` narrows it to one drive, board or chip. */
export function printAddress(caseId: string, what: Printed, of?: string, size?: string): string {
  const query = new URLSearchParams({ ...(of ? { of } : {}), ...(size ? { size } : {}) }).toString();
  return `/cases/${caseId}/print/${what}${query ? `?${query}` : ""}`;
}

export function casePrints(caseId: string): PrintLink[] {
  return [
    { href: printAddress(caseId, "labels"), label: "Labels" }, { href: printAddress(caseId, "job-ticket"), label: "Job ticket" }, { href: printAddress(caseId, "receipt"), label: "Receipt" },
    { href: printAddress(caseId, "read-sheet"), label: "Read sheets" }, { href: printAddress(caseId, "return-slip"), label: "Return slip" }, { href: `/cases/${caseId}/print`, label: "All that can be printed" },
  ];
}

export function drivePrints(caseId: string, driveId: string): PrintLink[] {
  return [{ href: printAddress(caseId, "labels", driveId), label: "Label of the drive" }, { href: printAddress(caseId, "labels"), label: "All labels of the case" }, { href: printAddress(caseId, "job-ticket"), label: "Job ticket" }, { href: `/cases/${caseId}/print`, label: "All that can be printed" }];
}

export function chipPrints(caseId: string, chipId: string, board: "original" | "donor"): PrintLink[] {
  return [
    { href: printAddress(caseId, "labels", chipId), label: "Card for its tray" }, { href: printAddress(caseId, "read-sheet", chipId), label: "Read sheet" },
    ...(board === "original" ? [{ href: printAddress(caseId, "write-ticket", chipId), label: "Write ticket" }] : []), { href: `/cases/${caseId}/print`, label: "All that can be printed" },
  ];
}
