/** Board facts that decide whether a donor fits (PRODUCT.md, "Board"). */
export interface FitFacts {
  boardNumber: string;
  revision?: string | null;
  controllerMarking?: string | null;
  motorDriverMarking?: string | null;
}

export interface DonorFit {
  /** other-number needs a lead's reason; caution is shown; fits stands */
  verdict: "fits" | "caution" | "other-number";
  differences: string[];
}

/** Without case and white space, as markings are compared. */
export function bareMarking(text: string): string {
  return text.replace(/\s+/gu, "").toUpperCase();
}

/** Board numbers compare without case and white space: "BX 40-3179" is "bx40-3179". */
export function sameMarking(a: string, b: string): boolean {
  return bareMarking(a) === bareMarking(b);
}

const LOOKED_AT: { key: "revision" | "controllerMarking" | "motorDriverMarking"; name: string }[] = [
  { key: "revision", name: "revision" },
  { key: "controllerMarking", name: "controller marking" },
  { key: "motorDriverMarking", name: "motor driver marking" },
];

/** Equal board number fits; what is known of both boards and differs is a caution; another number is said first. */
export function donorFit(original: FitFacts, donor: FitFacts): DonorFit {
  const differences: string[] = [];
  const sameNumber = sameMarking(original.boardNumber, donor.boardNumber);
  if (!sameNumber) differences.push(`Board number ${donor.boardNumber}; the original has ${original.boardNumber}.`);
  for (const { key, name } of LOOKED_AT) {
    const [mine, theirs] = [original[key], donor[key]];
    if (mine && theirs && !sameMarking(mine, theirs)) differences.push(`Another ${name}: ${theirs}; the original has ${mine}.`);
  }
  if (!sameNumber) return { verdict: "other-number", differences };
  return { verdict: differences.length > 0 ? "caution" : "fits", differences };
}
