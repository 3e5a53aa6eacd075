import type { Metadata } from "next";
import { ApiHelp } from "@/components/help/api";
import { HelpFrame } from "@/components/help/help-frame";
import { HelpPage } from "@/components/help/help-page";
import { topicOf } from "@/components/help/topics";
import { shellForAnyone } from "@/lib/auth/page";
import { env } from "@/lib/env";
import { OPERATIONS } from "@/lib/http/openapi/document";

export const metadata: Metadata = { title: "Help: The interface for scripts" };

export default async function ApiHelpPage() {
  const routes = OPERATIONS.filter((one) => one.stable).map(({ method, path, who, summary }) => ({ method, path, who, summary }));
  return (
    <HelpFrame {...await shellForAnyone()}>
      <HelpPage topic={topicOf("api")!}><ApiHelp address={env().publicUrl} routes={routes} /></HelpPage>
    </HelpFrame>
  );
}
