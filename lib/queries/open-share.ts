import { createHash } from "node:crypto";
import { Share } from "@/models";

/** SHA-256 of a private link's secret: only this is stored. */
export const shareHash = (token: string) => createHash("sha256").update(token).digest();

/** The share behind a private link, or null when it is unknown, has expired or was withdrawn: all three look the same. */
export async function openShare(token: string): Promise<Share | null> {
  if (!/^[A-Za-z0-9_-]{43}$/.test(token)) return null;
  const share = await Share.findOne({ where: { tokenHash: shareHash(token) } });
  return share && !share.withdrawnAt && share.expiresAt.getTime() > Date.now() ? share : null;
}
