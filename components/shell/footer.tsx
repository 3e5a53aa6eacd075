import Link from "next/link";
import type { ReactNode } from "react";

export function Footer({ workshop, timeZone, keys }: { workshop: string; timeZone: string; keys?: ReactNode }) {
  return (
    <div className="no-print mx-auto max-w-[1440px] px-8 grand:max-w-[1680px] phone:px-4">
      <footer className="mt-2 flex flex-wrap justify-between gap-x-6 gap-y-1 border-t border-rule pt-3.5 pb-7 text-t2 text-ink-2">
        <span>{workshop}</span>
        <span className="flex gap-x-6"><Link href="/help">Help</Link>{keys}</span>
        <span>All times {timeZone}</span>
      </footer>
    </div>
  );
}
