import { Note } from "@/components/ui/note";
import { donorFit, type FitFacts } from "@/lib/core/donor-fit";

/** Says while it is typed whether the donor fits the original. */
export function DonorFitNote({ original, donor, isLead }: { original: FitFacts; donor: FitFacts; isLead: boolean }) {
  if (!donor.boardNumber.trim()) return null;
  const { verdict, differences } = donorFit(original, donor);
  if (verdict === "fits") return <Note kind="ok" title="This donor fits.">The board number equals the original’s; nothing known of both differs.</Note>;
  const list = <ul className="list-disc pl-5">{differences.map((difference) => <li key={difference}>{difference}</li>)}</ul>;
  if (verdict === "caution") return <Note kind="caution" title="The board number is equal, but look at the rest.">{list}</Note>;
  return <Note kind="block" title={isLead ? "Another board number: give a reason for taking it." : "Another board number: take another donor, or ask a lead to record it."}>{list}A wrong donor can leave a drive beyond repair.</Note>;
}
