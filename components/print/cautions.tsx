/** The cautions that a paper at the bench carries. */
const CAUTIONS = {
  static: "Wrist strap and mat on. The board leaves its bag only on the mat.",
  power: "Take all power away before the clip goes on or comes off.",
  supply: "Set the supply first: a 1.8 V chip is destroyed by 3.3 V or 5 V.",
  heat: "No heat on a chip before its agreed reads exist. Mind fumes.",
  original: "Never write to the original chip.",
  donor: "Save the donor’s content first: two equal reads.",
  encrypted: "Encrypted, or perhaps so: the enclosure’s small board and the drive stay together. Images may hold key material.",
  enclosure: "Keep the enclosure’s small board with the drive: it may hold the key to the data.",
} as const;
export type Caution = keyof typeof CAUTIONS;

export function Cautions({ of }: { of: readonly Caution[] }) {
  return <ul className="caution-list">{of.map((key) => <li key={key}>{CAUTIONS[key]}</li>)}</ul>;
}
