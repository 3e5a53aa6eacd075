import Link from "next/link";

const LISTS = [
  { key: "sessions", label: "Sessions", href: "/audit/sign-ins" },
  { key: "limits", label: "Too many tries", href: "/audit/sign-ins/limits" },
  { key: "tokens", label: "Bench tokens", href: "/audit/sign-ins/tokens" },
] as const;

/** The three lists about signing in. */
export function SignInLists({ current }: { current: (typeof LISTS)[number]["key"] }) {
  return (
    <nav aria-label="Lists about signing in" className="no-print pb-4">
      <span className="seg">{LISTS.map(({ key, label, href }) => <Link key={key} href={href} aria-current={key === current ? "true" : undefined}>{label}</Link>)}</span>
    </nav>
  );
}
