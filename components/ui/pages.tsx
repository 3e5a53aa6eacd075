import { withCommas } from "@/lib/core/quantity";
import { Button, ButtonLink } from "./button";
import { Empty } from "./empty";
import { Icon } from "./icon";

interface Given {
  total: number;
  page: number;
  pageSize: number;
  href: (page: number) => string;
}

/** In place of a list's rows when its address names a page that it hasn't, or hasn't any more. */
export function PastTheEnd({ total, page, pageSize, href }: Given) {
  const last = Math.max(1, Math.ceil(total / pageSize));
  return <Empty title={`There is no page ${withCommas(page)}.`} action={<ButtonLink href={href(last)}>{last === 1 ? "Show the list" : `Go to page ${withCommas(last)}, the last`}</ButtonLink>}>The list has {withCommas(total)} in all.</Empty>;
}

/** "1 to 25 of 143" or "15 in all", with the pages before and after. */
export function Pages({ total, page, pageSize, href }: Given) {
  const last = Math.max(1, Math.ceil(total / pageSize));
  const from = Math.min(total, (page - 1) * pageSize + 1);
  const before = <><Icon name="prev" />Previous</>;
  const after = <>Next<Icon name="next" /></>;
  return (
    <nav aria-label="Pages" className="no-print flex flex-wrap items-center justify-between gap-3 pt-3 text-t2 text-ink-2">
      <span>{last === 1 ? `${withCommas(total)} in all` : <>{withCommas(from)} to {withCommas(Math.min(total, page * pageSize))} of {withCommas(total)}</>}</span>
      {last > 1 ? (
        <span className="flex gap-2">
          {page > 1 ? <ButtonLink size="small" href={href(page - 1)}>{before}</ButtonLink> : <Button size="small" disabled>{before}</Button>}
          {page < last ? <ButtonLink size="small" href={href(page + 1)}>{after}</ButtonLink> : <Button size="small" disabled>{after}</Button>}
        </span>
      ) : null}
    </nav>
  );
}
