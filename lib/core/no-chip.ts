/** A board whose unique data lies inside its main controller: the same words on the page, in a refusal and on paper. */
export const NO_CHIP_TITLE = "There is no chip to move: this board’s own data lies inside the main controller.";
export const NO_CHIP_TEXT = [
  "On most boards the drive’s own configuration data sits in a small memory chip, which can be read and brought to a donor board. On this one it sits in the main controller itself, where no clip reaches it, so a donor board would come without it and the drive would not start.",
  "The transfer is not applicable to this drive. Put the case on hold while the customer decides, or close it without transfer. The boards, photos and log stay on record.",
] as const;

export const NO_CHIP_REFUSAL = "This board is recorded with its unique data inside the main controller, so none of its chips needs a transfer. Record the chip as kept for reference, or correct the board first.";
export const NO_DONOR_REFUSAL = "The original board is recorded with its unique data inside the main controller: there is no chip to move, and a donor board would take nothing. Correct the original board first if that is wrong.";
