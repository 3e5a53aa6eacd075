import { Note } from "@/components/ui/note";
import { encryptionCaution } from "@/lib/core/encryption";
import type { Encryption } from "@/lib/core/words";

/** On every page of a drive that is, or may be, encrypted; nothing otherwise. */
export function EncryptionNote({ encryption, className }: { encryption: Encryption | null; className?: string }) {
  const caution = encryptionCaution(encryption);
  return caution ? <Note kind="caution" title={caution.title} className={className}>{caution.text}</Note> : null;
}
