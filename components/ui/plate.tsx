/** U3 as a silkscreen legend: filled for the customer's board, outlined for the donor; the dot is pin 1. */
export function DesignatorPlate({ designator, board, word = false, large = false }: {
  designator: string;
  board: "original" | "donor";
  /** show "orig." or "donor" before it; else the word is there for screen readers only */
  word?: boolean;
  large?: boolean;
}) {
  const side = board === "original" ? "orig." : "donor";
  return (
    <span className="inline-flex items-center gap-1.5 whitespace-nowrap">
      <span className={word ? "text-t2 text-ink-2" : "sr-only"}>{side} </span>
      <span className={`plate plate-${board} ${large ? "plate-large" : ""}`}>{designator}</span>
    </span>
  );
}
