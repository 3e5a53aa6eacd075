import type { Metadata } from "next";
import { ChipScreen } from "@/components/chip/chip-screen";
import { Photos } from "@/components/photo/photos";
import { DeskShell } from "@/components/shell/desk-shell";
import { FreshCache } from "@/components/ui/fresh-cache";
import { Section } from "@/components/ui/section";
import { signedIn } from "@/lib/auth/page";
import { orNotFound } from "@/lib/http/page-errors";
import { chipView } from "@/lib/queries/chip-view";
import { addsPhotos, photosOf } from "@/lib/queries/photos";
import { readBackView } from "@/lib/queries/read-back-view";
import { dayIn } from "@/lib/queries/workshop-day";

export const metadata: Metadata = { title: "Chip" };

/** The main screen: everything about one chip, live. */
export default async function ChipPage({ params }: { params: Promise<{ id: string }> }) {
  const { actor, session } = await signedIn();
  const { id } = await params;
  const chip = await orNotFound(() => chipView(actor, id));
  const readBack = await readBackView(actor, chip);
  const [photos, addsPhoto] = await Promise.all([photosOf(actor, "chip", id), addsPhotos(actor, "chip", id)]);
  const gallery = (
    <Section id="photos" title="Photos" note="Of the chip: its marking, and how the clip sits.">
      <Photos of={{ type: "chip", id }} name={chip.designator} photos={photos} adds={addsPhoto} timeZone={session.timeZone} />
    </Section>
  );
  return (
    <DeskShell session={session} current="bench">
      <FreshCache><ChipScreen chip={chip} readBack={readBack} session={session} today={dayIn(session.timeZone, new Date())} photos={gallery} /></FreshCache>
    </DeskShell>
  );
}
