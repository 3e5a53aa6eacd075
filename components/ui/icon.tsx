const PATHS = {
  copy: <path d="M5.5 5.5h8v8h-8zM10.5 3V2h-8v8h1" strokeWidth="1.4" />,
  search: <><circle cx="7" cy="7" r="4.6" /><path d="M10.5 10.5L14.5 14.5" /></>,
  lamp: <><path d="M3 14.2h7M6.5 14V9.6L3.6 6.4 8 2.4l2 2.2" strokeWidth="1.5" /><path d="M8.6 6.6l5-4.4.9 6.4z" fill="currentColor" stroke="none" /></>,
  next: <path d="M3 8h9M8.5 4.2L12.3 8l-3.8 3.8" />,
  prev: <path d="M13 8H4M7.5 4.2L3.7 8l3.8 3.8" />,
  up: <path d="M8 13V4M4.2 7.5L8 3.7l3.8 3.8" />,
  print: <path d="M4 6V1.8h8V6M4 11.5H1.8V6h12.4v5.5H12M4 9.5h8v4.7H4z" strokeWidth="1.4" />,
  down: <path d="M8 2v8.2M4.4 7L8 10.6 11.6 7M2.5 13.7h11" />,
  close: <path d="M3.5 3.5l9 9M12.5 3.5l-9 9" />,
  menu: <path d="M4 6.2l4 4 4-4" />,
  equal: <path d="M2.7 5.9h10.6M2.7 10.1h10.6" strokeWidth="2.3" />,
} as const;
export type IconName = keyof typeof PATHS;

/** Line drawings of 16 px. The type faces have no arrows or check marks, so these are drawn. */
export function Icon({ name, size = 16, label, className = "" }: { name: IconName; size?: number; label?: string; className?: string }) {
  const words = label ? { role: "img", "aria-label": label } : { "aria-hidden": true as const };
  return (
    <svg className={`inline-block flex-none align-[-3px] ${className}`} viewBox="0 0 16 16" width={size} height={size} fill="none" stroke="currentColor" strokeWidth="1.6" {...words}>
      {PATHS[name]}
    </svg>
  );
}
