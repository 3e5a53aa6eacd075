import { reachWords } from "@/components/request/contact-words";
import { LinkShowsNothing } from "@/components/shell/link-shows-nothing";
import { env } from "@/lib/env";

export default function SummaryNotFound() {
  const { workshop, demo, workshopContact } = env();
  return <LinkShowsNothing workshop={workshop} demo={demo} ask={reachWords(workshopContact)} />;
}
