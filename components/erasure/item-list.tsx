import { Digest } from "@/components/ui/digest";
import { sizeText } from "@/lib/core/quantity";
import type { ErasureItemView } from "@/lib/views";

/** Images by what they are kept as, with size and digest; a long list scrolls by itself. */
export function ItemList({ items, label }: { items: (ErasureItemView & { also?: string[] })[]; label: string }) {
  return (
    <ul className="max-h-[220px] overflow-y-auto border-y border-rule" aria-label={label} tabIndex={items.length > 4 ? 0 : undefined}>
      {items.map((item) => (
        <li key={item.sha256} className="border-b border-rule py-1.5 text-t2 last:border-b-0">
          <span className="block [overflow-wrap:anywhere]">{item.names.join("; ")}</span>
          {item.also && item.also.length > 0 ? <span className="block text-ink-2 [overflow-wrap:anywhere]">Also {item.also.slice(0, 3).join("; ")}{item.also.length > 3 ? `; and ${item.also.length - 3} more` : ""}</span> : null}
          <span className="text-ink-2">{sizeText(item.sizeBytes)}, SHA-256 <Digest sha256={item.sha256} /></span>
        </li>
      ))}
    </ul>
  );
}
