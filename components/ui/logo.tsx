/** A chip seen from above whose two pin rows are equal: two reads that agree. */
export function Logo({ width = 31, className = "" }: { width?: number; className?: string }) {
  return (
    <svg viewBox="0 0 31 24" width={width} height={(width * 24) / 31} className={`flex-none ${className}`} aria-hidden="true">
      <path fill="var(--pad)" d="M2 3h3v6H2zM8 6h3v3H8zM14 0h3v9h-3zM20 4h3v5h-3zM26 2h3v7h-3zM2 21h3v-6H2zM8 18h3v-3H8zM14 24h3v-9h-3zM20 20h3v-5h-3zM26 22h3v-7h-3z" />
      <path fill="currentColor" d="M0 10.5h31v3H0z" />
    </svg>
  );
}
