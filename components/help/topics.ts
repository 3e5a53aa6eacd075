/** The pages of the help, in the order of the work. */
export const TOPICS = [
  { key: "request", title: "Request and receiving", about: "From the public form to a parcel that is photographed, labelled and on record." },
  { key: "identify", title: "Identify and record", about: "Drive, boards and chips: what to write down, and why the supply comes first." },
  { key: "reads", title: "Taking good reads", about: "How many, in how many seatings, and what to do before the clip goes on." },
  { key: "differ", title: "When reads differ", about: "Finding the odd one, setting it aside, and what to do when no two agree." },
  { key: "approval", title: "Approval", about: "What has to be so before a second person clears an image, and what takes that back." },
  { key: "transfer", title: "Transfer and read-back", about: "Writing the image or moving the chip, and showing that what is there is what was cleared." },
  { key: "custody", title: "Custody log, seals and bundle", about: "Who did what and when, and how to check it without us." },
  { key: "return", title: "Return and close", about: "Start-up test, what goes back, the summary, and what stays." },
  { key: "findings", title: "What each finding means", about: "Every finding of the read check: what it says, what it means, what to do at the bench." },
  { key: "limits", title: "What it does not prove", about: "What equal reads don’t show, and what a transfer is not." },
  { key: "cautions", title: "Cautions", about: "What can hurt you, the chip or the customer. Read it once before the first chip." },
  { key: "words", title: "Words", about: "What each word on the screens means, and the states of a chip." },
  { key: "api", title: "The interface for scripts", about: "Reads from the bench by curl: sign-in, upload, comparison, download, and what an error looks like." },
] as const;

export type TopicKey = (typeof TOPICS)[number]["key"];
export type Topic = (typeof TOPICS)[number];

export function topicOf(key: string): Topic | undefined {
  return TOPICS.find((topic) => topic.key === key);
}

/** The page before and the one after, for whoever reads on. */
export function neighbours(key: TopicKey): { before: Topic | null; after: Topic | null } {
  const at = TOPICS.findIndex((topic) => topic.key === key);
  return { before: TOPICS[at - 1] ?? null, after: TOPICS[at + 1] ?? null };
}
