/** What can hurt a person, a chip or a customer, in the order of the work. Each page shows those of its step. */
export const CAUTIONS = {
  static: { title: "Static discharge.", text: "Wear a wrist strap and work on a grounded mat. A chip that a spark has hurt may still read, and fail later." },
  power: { title: "Take power away first.", text: "Unplug drive and board before a clip goes on or comes off. A board under power talks on the same lines, and a clip that slips makes a short." },
  voltage: { title: "Look the supply up first.", text: "A chip for 1.8 V is destroyed by 3.3 V or 5 V. If the marking doesn’t tell, treat it as 1.8 V until you know." },
  heat: { title: "No heat before agreed reads.", text: "Never heat a chip before agreed reads of it exist, or nobody can say afterwards what it held. If it can’t be read in place, let a lead decide and write the reason down." },
  fumes: { title: "Heat and fumes.", text: "Lifting a chip means hot air, hot metal and flux fumes: extract the air, shield what lies beside the chip, and let the board cool before you touch it." },
  original: { title: "Never write to the original chip.", text: "It holds the only copy there is. Clips and programs that can write are set to read, or their write line is held." },
  donor: { title: "Save the donor’s content first.", text: "Two equal reads of the donor’s chip before anything is written to it: afterwards they can’t be had any more." },
  smallBoard: { title: "Keep the enclosure’s small board with the drive.", text: "It may hold the key to the data. Don’t swap it, don’t throw it away, and don’t send the drive back without it." },
  wrongImage: { title: "A wrong image can end a drive.", text: "With another drive’s data the heads may be driven wrongly, and the drive is then beyond repair. Compare label, ticket and digest before the write and before the first start." },
  consent: { title: "The customer’s data and leave.", text: "Do what the customer agreed to, and no more: solder, keep images and open the drive only with their leave. Images can hold key material and personal data." },
} as const;
export type CautionKey = keyof typeof CAUTIONS;
export const CAUTION_KEYS = Object.keys(CAUTIONS) as CautionKey[];
