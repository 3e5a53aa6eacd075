import { BEGIN } from "./check-script/begin";
import { KEYS } from "./check-script/keys";
import { LISTS } from "./check-script/lists";
import { LOGS } from "./check-script/logs";
import { SEAL } from "./check-script/seal";

/**
 * The bundle's check.sh: POSIX sh, sha256sum, OpenSSL 3 and standard tools, so that whoever gets a bundle can check it
 * without the program that made it. It takes every file for hostile: texts of a log are only matched where unescaped
 * quotes of the canonical form stand, which no text inside a fact can hold. lib/core/verify comes to the same verdict.
 */
export const CHECK_SCRIPT = BEGIN + LISTS + KEYS + LOGS + SEAL;
