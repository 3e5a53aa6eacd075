import Link from "next/link";

/** The way from something on the screen to its place in the help. `about` says what, for whoever hears links out of their line. */
export function HelpLink({ href, about, words = "What is this?" }: { href: string; about: string; words?: string }) {
  return <Link href={href} prefetch={false} aria-label={`${words} ${about}`} className="text-t2 whitespace-nowrap text-ink-2 print:hidden">{words}</Link>;
}
