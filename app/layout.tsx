import type { Metadata } from "next";
import { cookies } from "next/headers";
import type { ReactNode } from "react";
import "@fontsource-variable/atkinson-hyperlegible-next/wght.css";
import "@fontsource-variable/atkinson-hyperlegible-mono/wght.css";
import "./globals.css";

export const metadata: Metadata = {
  title: { default: "Twinread", template: "%s, Twinread" },
  description: "The vault and the conscience of the chip transfer bench",
  robots: { index: false, follow: false },
};

// Each page carries a nonce of its own in its content security policy, so none can be made ahead of time.
export const dynamic = "force-dynamic";

export default async function RootLayout({ children }: { children: ReactNode }) {
  const theme = (await cookies()).get("theme")?.value;
  return (
    <html lang="en-GB" data-theme={theme === "day" || theme === "night" ? theme : undefined} suppressHydrationWarning>
      <body>{children}</body>
    </html>
  );
}
