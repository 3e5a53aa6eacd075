import type { ReactNode } from "react";

/** The part of a page that is read and decided: warm paper, the page's width, target of "Go to the main part". */
export function PageMain({ children, className = "" }: { children: ReactNode; className?: string }) {
  return (
    <main id="main" tabIndex={-1} className={`mx-auto max-w-[1440px] px-8 outline-none grand:max-w-[1680px] phone:px-4 print:max-w-none print:p-0 ${className}`}>
      {children}
    </main>
  );
}
