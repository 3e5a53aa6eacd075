import type { Metadata } from "next";
import { PublicShell } from "@/components/shell/public-shell";
import { PageTitle, Section } from "@/components/ui/section";
import { VerifyScreen } from "@/components/verify/verify-screen";
import { env } from "@/lib/env";

export const metadata: Metadata = { title: "Check a case bundle" };

export default function VerifyPage() {
  const { workshop, demo } = env();
  return (
    <PublicShell workshop={workshop} demo={demo} checking line="No account is needed here">
      <main id="main" tabIndex={-1} className="mx-auto max-w-[1120px] px-8 pb-12 outline-none phone:px-4 print:max-w-none print:p-0">
        <PageTitle note="Its files, its custody logs, their signatures and the seal over them, each part by itself.">Check a case bundle</PageTitle>
        <VerifyScreen />
        <Section title="What this does not show">
          <p className="max-w-[66ch] text-t4">This page comes from the workshop’s own server, and a server that wanted to could send one that lies. To trust nobody here, run <code>sh check.sh</code> of the bundle with OpenSSL on a machine of your own, or open this page from another Twinread.</p>
        </Section>
      </main>
    </PublicShell>
  );
}
