import type { Metadata } from "next";
import { HelpFrame } from "@/components/help/help-frame";
import { HelpIndex } from "@/components/help/help-index";
import { shellForAnyone } from "@/lib/auth/page";

export const metadata: Metadata = { title: "Help" };

export default async function HelpPage() {
  return <HelpFrame {...await shellForAnyone()}><HelpIndex /></HelpFrame>;
}
