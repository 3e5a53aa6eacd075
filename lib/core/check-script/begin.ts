/** What stands first in check.sh: what it is, what it needs, how it speaks. */
export const BEGIN = String.raw`#!/bin/sh
# Checks this case bundle: its files, lists, keys, custody logs and seal. README.txt says what they are.
#   sh check.sh                    everything, but not whose keys they are
#   sh check.sh KEY-FINGERPRINT    also compares the log key or the seal key with a fingerprint that you have from elsewhere
# It changes nothing. It ends with 0: all in order, 1: something is not, 2: could not check.
set -u
LC_ALL=C
export LC_ALL
BAD=0
ENTRIES=0
LOGS=0

cannot() { echo "Could not check: $1"; exit 2; }
bad() { echo "NOT IN ORDER: $1"; BAD=$((BAD + 1)); }
ok() { echo "in order: $1"; }
# each line of a file is one thing that is not in order
each_bad() { while IFS= read -r found; do bad "$2$found"; done <"$1"; }

cd "$(dirname "$0")" || cannot "the folder of check.sh can't be entered."
for tool in awk cmp comm cut find grep ls mktemp openssl sed sha256sum sort tail tr uniq xargs; do
  command -v "$tool" >/dev/null 2>&1 || cannot "$tool is missing. Install it and run this again."
done
case $(openssl version) in
  "OpenSSL "[3-9]*) ;;
  *) cannot "OpenSSL 3 or later is needed, this is $(openssl version)." ;;
esac
WANT=
if [ $# -gt 0 ]; then
  WANT=$(printf '%s' "$*" | tr -d ' :' | tr 'A-F' 'a-f')
  printf '%s\n' "$WANT" | grep -q '^[0-9a-f]\{64\}$' || cannot "a key fingerprint has 64 hex digits. Check what you gave."
fi
TMP=$(mktemp -d) || cannot "there is no place for temporary files."
trap 'rm -rf "$TMP"' EXIT
trap 'exit 2' HUP INT TERM
mkdir "$TMP/keys" "$TMP/order" "$TMP/sealkeys"
`;
