import { LinkShowsNothing } from "@/components/shell/link-shows-nothing";
import { env } from "@/lib/env";

export default function SummaryNotFound() {
  const { workshop, demo } = env();
  return <LinkShowsNothing workshop={workshop} demo={demo} />;
}
