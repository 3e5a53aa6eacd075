/** The fields of the public form as a browser sends them: a request that is in order. */
export function answers(change: Record<string, unknown> = {}): Record<string, unknown> {
  return {
    name: "Edda Finch", company: "Harrow & Finch Surveyors", email: "edda.finch@harrowfinch.example", phone: "01632 960 144", returnAddress: "3 Mill Row\nFennick ZZ0 4AA",
    partNumber: "PN 4471-0093-B", serial: "9KQ3-70B8-D2", model: "", interface: "", capacity: "2 TB", made: "04/2019", boardNumber: "BX 40-3179", boardRevision: "C",
    enclosure: "sent", lock: "unknown", damage: "power-surge", happened: "Smell of burning after a storm.", tried: "Powered once more at the office. Not opened.", importance: "matters", neededBy: "",
    consentOwner: "yes", consentRead: "yes", consentWrite: "yes", consentSolder: "yes", keepDays: "90", signature: "Edda Finch", ...change,
  };
}
