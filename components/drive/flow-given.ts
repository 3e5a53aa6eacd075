/** What each form of the flow is given. */
export interface StepGiven {
  /** whose last values are proposed */
  userId: string;
  onClose(): void;
}
