import Link from "next/link";
import { PaperName } from "./paper-name";

export interface Crumb {
  label: string;
  href?: string;
}

export function Crumbs({ items }: { items: readonly Crumb[] }) {
  return (
    <nav aria-label="Where you are" className="pt-2.5">
      <PaperName what={items.map(({ label }) => label).join(", ")} />
      <ol className="flex flex-wrap gap-x-2 gap-y-1 text-t2 text-ink-2">
        {items.map((item, i) => (
          <li key={item.label} className="flex gap-2">
            {i > 0 ? <span aria-hidden="true" className="text-mask-line">/</span> : null}
            {item.href ? <Link href={item.href} className="text-ink-2">{item.label}</Link> : <span aria-current="page">{item.label}</span>}
          </li>
        ))}
      </ol>
    </nav>
  );
}
