import Link from "next/link";
import { AUDIT_SECTIONS, type AuditSection } from "./audit-sections";

const HERE = "border-copper-2 font-bold text-ink";
const THERE = "border-transparent text-ink-2 hover:border-rule-2";

/** The way between the audit pages: words, copper under where you are; the first section's rule is their ground. Workshop-wide pages are not there for a limited auditor. */
export function AuditNav({ current, limited }: { current: AuditSection | null; limited: boolean }) {
  const links = [{ key: null, label: "Overview", href: "/audit" }, ...AUDIT_SECTIONS.filter((section) => !limited || !section.workshop).map(({ key, label }) => ({ key, label, href: `/audit/${key}` }))];
  return (
    <nav aria-label="Audit" className="no-print">
      <ul className="flex flex-wrap gap-x-6 phone:gap-x-5">
        {links.map(({ key, label, href }) => (
          <li key={label}><Link href={href} aria-current={key === current ? "page" : undefined} className={`flex min-h-9 items-center border-b-[3px] pt-1 no-underline ${key === current ? HERE : THERE}`}>{label}</Link></li>
        ))}
      </ul>
    </nav>
  );
}
