/** What a comparison looks like, for people: the code is a row of the catalogue, equal, different-length or unclassified. */
export interface DiagnosisView {
  code: string;
  message: string;
  advice: string;
  confidence: "certain" | "likely" | "unsure";
}

export interface DiagnosisContext {
  nameA: string;
  nameB: string;
  /** the chip's size, for the width of addresses */
  sizeBytes: number;
}
