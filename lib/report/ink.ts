/** The day set of the design's tokens on white paper, and the sizes of type in points. */
export const INK = "#1A201C";
export const INK_2 = "#424A44";
export const INK_3 = "#5C635B";
export const RULE = "#D0C8B3";
export const RULE_2 = "#837D6A";
export const MASK = "#0E4A38";
export const SILK = "#F4F2E6";
export const BARE_EDGE = "#B7A772";
export const GREEN = "#0E5A42";
export const COPPER = "#8A4718";
export const TRACE = "#B5652B";
export const BLOCK = "#A11D1B";
export const CAUTION = "#765000";
export const NOTE = "#1B5080";
export const DIFF = "#C0201D";

/** by the class of a strip's cell */
export const CELL = { b: "#6A6F60", z: "#1A201C", t: "#A9602A", o: "#4C8F77", d: "#0E4A38", n: "#837D6A" } as const;

export interface Style {
  face: "next" | "mono";
  bold: boolean;
  /** points */
  size: number;
  color: string;
}

export interface Span extends Style {
  text: string;
}

type Part = Partial<Style>;
const style = (part: Part): Style => ({ face: "next", bold: false, size: 9, color: INK, ...part });

export const plain = (text: string, part: Part = {}): Span => ({ text, ...style(part) });
export const strong = (text: string, part: Part = {}): Span => ({ text, ...style({ bold: true, ...part }) });
export const quiet = (text: string, part: Part = {}): Span => ({ text, ...style({ color: INK_2, ...part }) });
/** Identifiers, digests, addresses. */
export const code = (text: string, part: Part = {}): Span => ({ text, ...style({ face: "mono", size: 8.5, ...part }) });
