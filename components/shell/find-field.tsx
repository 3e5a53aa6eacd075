"use client";

import { useRouter } from "next/navigation";
import { useCallback, useRef } from "react";
import { Icon } from "@/components/ui/icon";
import { useLetterKeys, useLetterKeysOn } from "@/components/ui/letter-keys";

/** Case, serial or digest, from anywhere; `/` goes there. A plain form, so that it works before any script. */
export function FindField() {
  const field = useRef<HTMLInputElement>(null);
  const router = useRouter();
  const [keys] = useLetterKeysOn();
  useLetterKeys(keys, useCallback((letter: string) => {
    if (letter !== "/") return false;
    // on a narrow screen the field is on a page of its own
    if (field.current?.offsetParent) field.current.focus();
    else router.push("/find");
    return true;
  }, [router]));
  return (
    <form action="/find" role="search" aria-label="Find from any page" className="relative flex items-center phone:hidden">
      <label htmlFor="find" className="sr-only">Find a case, serial or digest</label>
      <Icon name="search" className="absolute left-[9px] text-silk-2" />
      <input ref={field} id="find" name="q" autoComplete="off" placeholder="Case, serial or digest" className="h-[34px] w-[248px] rounded-none border border-mask-line bg-mask-deep pr-[34px] pl-8 text-silk placeholder:text-silk-2 mid:w-[180px]" />
      <kbd aria-hidden="true" className="absolute right-2 border border-mask-line px-[5px] !text-t1 leading-4 text-silk-2">/</kbd>
    </form>
  );
}
