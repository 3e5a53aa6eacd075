import type { Metadata } from "next";
import localFont from "next/font/local";
import { cookies } from "next/headers";
import type { ReactNode } from "react";
import { FocusKeeper } from "@/components/shell/focus-keeper";
import "./globals.css";

// Preloaded, and never put in the place of another face later on: a page that is there doesn't move when a face comes late.
const face = localFont({ display: "optional", variable: "--next-face", weight: "200 800", src: "../node_modules/@fontsource-variable/atkinson-hyperlegible-next/files/atkinson-hyperlegible-next-latin-wght-normal.woff2" });
const mono = localFont({ display: "optional", variable: "--next-mono", weight: "200 800", adjustFontFallback: false, fallback: ["DejaVu Sans Mono", "monospace"], src: "../node_modules/@fontsource-variable/atkinson-hyperlegible-mono/files/atkinson-hyperlegible-mono-latin-wght-normal.woff2" });

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
    <html lang="en-GB" className={`${face.variable} ${mono.variable}`} data-theme={theme === "day" || theme === "night" ? theme : undefined} suppressHydrationWarning>
      {/* Nothing is drawn before all of the page is there: a long table would move as its rows come. */}
      <head><link rel="expect" href="#whole" blocking="render" /></head>
      <body>{children}<FocusKeeper /><span id="whole" hidden /></body>
    </html>
  );
}
