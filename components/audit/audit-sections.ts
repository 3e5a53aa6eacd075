/** The pages of the audit, in the order in which an auditor asks. */
export const AUDIT_SECTIONS = [
  { key: "drives", label: "Logs", workshop: false },
  { key: "seals", label: "Seals", workshop: false },
  { key: "images", label: "Stored images", workshop: false },
  { key: "assessments", label: "Assessments", workshop: false },
  { key: "hand-outs", label: "Hand-outs", workshop: false },
  { key: "refusals", label: "Refusals", workshop: false },
  { key: "sign-ins", label: "Sign-ins", workshop: true },
  { key: "clock", label: "Clock", workshop: false },
] as const;
export type AuditSection = (typeof AUDIT_SECTIONS)[number]["key"];
