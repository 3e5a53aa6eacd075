import Link from "next/link";
import type { ReactNode } from "react";
import { Crumbs } from "@/components/ui/crumbs";
import { PageTitle } from "@/components/ui/section";
import { neighbours, type Topic } from "./topics";

/** One page of the help: where it belongs, its title, and the way to the pages before and after it. */
export function HelpPage({ topic, children }: { topic: Topic; children: ReactNode }) {
  const { before, after } = neighbours(topic.key);
  return (
    <>
      <div className="no-print"><Crumbs items={[{ label: "Help", href: "/help" }, { label: topic.title }]} /></div>
      <PageTitle note={topic.about}>{topic.title}</PageTitle>
      {children}
      <nav aria-label="More help" className="no-print flex flex-wrap justify-between gap-x-6 gap-y-2 border-t border-rule pt-4">
        {before ? <Link href={`/help/${before.key}`} className="py-1">Before this: {before.title}</Link> : <Link href="/help" className="py-1">All pages</Link>}
        {after ? <Link href={`/help/${after.key}`} className="py-1">Next: {after.title}</Link> : <Link href="/help" className="py-1">All pages</Link>}
      </nav>
    </>
  );
}
