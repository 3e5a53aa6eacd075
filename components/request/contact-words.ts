/** "desk@workshop.example or 01632 960 100"; "the workshop" where it has named neither. */
export function reachWords({ email, phone }: { email: string | null; phone: string | null }): string {
  return [email, phone].filter(Boolean).join(" or ") || "the workshop";
}

/** Line in the head of the customers' pages: "12 Alder Lane, Fennick ZZ0 8BD · Mon to Fri, 9 to 17". */
export function placeWords(address: readonly string[], hours: string | null): string | undefined {
  return [address.join(", "), hours].filter(Boolean).join(" · ") || undefined;
}
