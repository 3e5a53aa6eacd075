/**
 * The bundle's check.sh: POSIX sh, sha256sum, OpenSSL 3 and standard tools, so that whoever gets a bundle can check it
 * without the program that made it. It takes every file for hostile: texts of a log are only matched where unescaped
 * quotes of the canonical form stand, which no text inside a fact can hold.
 */
export const CHECK_SCRIPT = String.raw`#!/bin/sh
# Checks this case bundle: its files, its lists, its custody logs and their signatures. README.txt says what they are.
#   sh check.sh                    everything, but not whose key it is
#   sh check.sh KEY-FINGERPRINT    also compares the log key with the fingerprint that you have from elsewhere
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
for tool in awk cmp comm cut find grep mktemp openssl sed sha256sum sort tail tr uniq xargs; do
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
mkdir "$TMP/keys"

# --- files and lists ---------------------------------------------------------------------------------------------
check_list() { # list, what it lists
  before=$BAD
  if [ ! -f "$1" ]; then bad "$1 is missing."; return; fi
  grep -qv '^[0-9a-f]\{64\}  [A-Za-z0-9_][A-Za-z0-9._/-]*$' "$1" && bad "$1 has a line that is not digest, two spaces, path."
  grep -q '\.\.' "$1" && bad "$1 names a path outside the bundle."
  cut -c67- "$1" | sort | uniq -d >"$TMP/twice"
  each_bad "$TMP/twice" "$1 lists twice: "
  sha256sum -c "$1" >"$TMP/sums" 2>&1 || { grep -v ': OK$' "$TMP/sums" >"$TMP/off"; each_bad "$TMP/off" ""; }
  [ "$BAD" -eq "$before" ] && ok "$(grep -c . "$1") $2 have the digests of $1"
}
check_list manifest-sha256.txt "files of the case"
check_list tagmanifest-sha256.txt "other files"
if [ -f manifest-sha256.txt ]; then
  grep -qv '^.\{66\}data/' manifest-sha256.txt && bad "manifest-sha256.txt lists something outside data."
fi
for name in bagit.txt bag-info.txt manifest-sha256.txt README.txt check.sh; do
  grep -q "^.\{66\}$name\$" tagmanifest-sha256.txt 2>/dev/null || bad "tagmanifest-sha256.txt does not list $name."
done
{
  cut -c67- manifest-sha256.txt
  cut -c67- tagmanifest-sha256.txt
  echo tagmanifest-sha256.txt
  echo tagmanifest-sha256.sig
} 2>/dev/null | sort >"$TMP/listed"
find . -type f | sed 's,^\./,,' | sort >"$TMP/present"
comm -13 "$TMP/listed" "$TMP/present" >"$TMP/extra"
each_bad "$TMP/extra" "a file that no list names: "
find . ! -type f ! -type d >"$TMP/strange"
each_bad "$TMP/strange" "neither file nor folder: "
[ -s "$TMP/extra" ] || [ -s "$TMP/strange" ] || ok "there is no file that no list names"

# --- the key and what it signs -----------------------------------------------------------------------------------
key_id() { # public key in PEM: SHA-256 of its SPKI DER
  openssl pkey -pubin -in "$1" -outform DER -out "$TMP/key.der" 2>/dev/null || return 1
  openssl pkey -pubin -in "$1" -noout -text 2>/dev/null | grep -q '^ED25519' || return 1
  sha256sum <"$TMP/key.der" | cut -c1-64
}
verify() { openssl pkeyutl -verify -pubin -inkey "$1" -rawin -in "$2" -sigfile "$3" >/dev/null 2>&1; }
holds() { # key id, signature in base64, what was signed
  [ -f "$TMP/keys/$1" ] || return 1
  printf '%s' "$2" | openssl base64 -d -A -out "$TMP/one.sig" 2>/dev/null && verify "$TMP/keys/$1" "$3" "$TMP/one.sig"
}
# One file a line, and one with what was signed for it; COUNT is the number of lines.
split_log() { # log without its ending, folder for the pieces
  COUNT=0
  for part in jsonl sig; do [ -f "$1.$part" ] || { bad "$1.$part is missing."; return 1; }; done
  tr -d '\000' <"$1.jsonl" | cmp -s - "$1.jsonl" || bad "$1.jsonl holds a NUL byte."
  [ -z "$(tail -c 1 "$1.jsonl")" ] || bad "$1.jsonl does not end with a whole line."
  mkdir -p "$2/line" "$2/signed"
  COUNT=$(awk -v to="$2" 'BEGIN { ORS = "" }
    { f = to "/line/" NR; print > f; close(f); f = to "/signed/" NR; print "twinread-custody/1\n" $0 > f; close(f) }
    END { print NR > "/dev/stdout" }' "$1.jsonl")
  if [ "$COUNT" -eq 0 ]; then bad "$1.jsonl is empty."; return 1; fi
  grep -qv '^[0-9a-f]\{64\} [A-Za-z0-9+/]\{86\}==$' "$1.sig" && bad "$1.sig has a line that is not key id, space, signature."
  [ "$(awk 'END { print NR }' "$1.sig")" -eq "$COUNT" ] || bad "$1.sig does not have one signature for each of $COUNT entries."
  return 0
}

LOG_KEY=$(key_id data/seal/log-key.pem) || { LOG_KEY=; bad "data/seal/log-key.pem is not an Ed25519 public key."; }
if [ -n "$LOG_KEY" ]; then
  if verify data/seal/log-key.pem tagmanifest-sha256.txt tagmanifest-sha256.sig; then ok "the log key has signed tagmanifest-sha256.txt, and with it every file"
  else bad "the signature tagmanifest-sha256.sig does not fit tagmanifest-sha256.txt."; fi
fi

# The first key introduces itself, each later one is signed by a key that came before it.
if split_log data/workshop-keys "$TMP/workshop"; then
  before=$BAD
  n=0
  while read -r key signature; do
    n=$((n + 1))
    line=$TMP/workshop/line/$n
    [ -f "$line" ] || break
    new=$(sed -n 's/^{"action":"key\.introduced",.*,"facts":{[^{}]*"keyId":"\([0-9a-f]\{64\}\)","publicKeyPem":"[^"]*","purpose":"log"[,}].*/\1/p' "$line")
    sed -n 's/.*"publicKeyPem":"\([-A-Za-z0-9+/= \\]*\)".*/\1/p' "$line" >"$TMP/pem"
    printf '%b' "$(cat "$TMP/pem")" >"$TMP/new.pem"
    if [ -n "$new" ] && [ "$(key_id "$TMP/new.pem")" != "$new" ]; then bad "data/workshop-keys.jsonl, line $n: the key's id is not its fingerprint."; continue; fi
    [ "$n" -eq 1 ] && [ "$key" = "$new" ] && cp "$TMP/new.pem" "$TMP/keys/$new"
    if ! holds "$key" "$signature" "$TMP/workshop/signed/$n"; then
      bad "data/workshop-keys.jsonl, line $n: no signature by a key known before fits it."
      [ -n "$new" ] && rm -f "$TMP/keys/$new"
    elif [ -n "$new" ]; then cp "$TMP/new.pem" "$TMP/keys/$new"; fi
  done <data/workshop-keys.sig
  [ -z "$LOG_KEY" ] || [ -f "$TMP/keys/$LOG_KEY" ] || bad "data/seal/log-key.pem is not among the keys that the workshop's log introduces."
  [ "$BAD" -eq "$before" ] && ok "the log's keys are introduced by signed entries of the workshop's log"
fi

# --- the custody log of each drive -------------------------------------------------------------------------------
check_log() { # number of the drive
  log=data/drives/$1/custody
  at=$TMP/drive$1
  before=$BAD
  LOGS=$((LOGS + 1))
  split_log "$log" "$at" || return
  (cd "$at/line" && awk -v n="$COUNT" 'BEGIN { for (i = 1; i <= n; i++) print i }' | xargs sha256sum) | cut -c1-64 >"$at/hashes"
  sed -e 's/^{"action":"[a-z.-]*",.*,"prev":"\([0-9a-f]\{64\}\)","seq":\([0-9][0-9]*\),"subject":{"id":"[0-9a-f-]*","type":"[a-z]*"},"v":1}$/\1 \2/' -e t -e 's/.*/unreadable 0/' "$log.jsonl" >"$at/links"
  awk 'NR == FNR { hash[FNR] = $1; next }
    FNR == 1 { want = "0000000000000000000000000000000000000000000000000000000000000000" }
    { if ($1 == "unreadable") print "entry " FNR " is not of the form twinread-custody/1."
      else { if ($2 + 0 != FNR) print "entry " FNR " has the number " $2 "."
        if (($1 "") != (want "")) print "entry " FNR " does not follow from the line before: a line was cut, moved, put in or changed." }
      want = hash[FNR] }' "$at/hashes" "$at/links" >"$at/breaks"
  each_bad "$at/breaks" "$log.jsonl: "
  n=0
  while read -r key signature; do
    n=$((n + 1))
    [ -f "$at/signed/$n" ] || break
    if [ ! -f "$TMP/keys/$key" ]; then bad "$log.jsonl: entry $n is signed with a key that nobody introduced."
    elif ! holds "$key" "$signature" "$at/signed/$n"; then bad "$log.jsonl: the signature of entry $n does not fit it."; fi
  done <"$log.sig"
  sed -n 's/^{"action":.*,"at":"[0-9TZ:.-]*","drive":"\([0-9a-f-]*\)","facts":{.*/\1/p' "$log.jsonl" | sort -u >"$at/chain"
  [ "$(grep -c . "$at/chain")" -eq 1 ] || bad "$log.jsonl holds entries of more than one log."
  cat "$at/chain" >>"$TMP/chains"
  case $(tail -n 1 "$log.jsonl") in
    '{"action":"bundle.started",'*) ;;
    *) bad "$log.jsonl does not end with the start of this bundle: its end was cut, or something was added." ;;
  esac
  sed -n -e 's/^{"action":"read\.stored",.*"read":{"id":"[0-9a-f-]*","number":\([0-9]*\),"stage":"\([a-z]*\)"},.*,"sha256":"\([0-9a-f]\{64\}\)","sizeBytes":.*/\3 \2-\1.bin/p' \
    -e 's/^{"action":"composite\.made",.*"read":{"id":"[0-9a-f-]*","number":\([0-9]*\),"stage":"\([a-z]*\)"},.*,"sha256":"\([0-9a-f]\{64\}\)","sizeBytes":.*/\3 \2-\1.bin/p' "$log.jsonl" | sort >"$at/told"
  sed -n "s,^\([0-9a-f]\{64\}\)  data/drives/$1/[^/]*/\([a-z]*-[0-9]*\.bin\)\$,\1 \2,p" manifest-sha256.txt | sort >"$at/kept"
  comm -23 "$at/told" "$at/kept" >"$at/missing"
  each_bad "$at/missing" "$log.jsonl names an image that the bundle does not hold: "
  comm -13 "$at/told" "$at/kept" >"$at/unknown"
  each_bad "$at/unknown" "drive $1 has an image that its custody log does not name: "
  ENTRIES=$((ENTRIES + COUNT))
  if [ "$BAD" -eq "$before" ]; then
    ok "drive $1: $COUNT entries, each following from the one before, each signed; $(grep -c . "$at/told") images, each as the log names it"
    echo "          head of this log: $COUNT $(tail -n 1 "$at/hashes")"
  fi
}
: >"$TMP/chains"
for folder in data/drives/*/; do
  number=$(basename "$folder")
  [ -d "$folder" ] && check_log "$number"
done
[ "$LOGS" -gt 0 ] || bad "there is no drive in this bundle."
[ -z "$(sort "$TMP/chains" | uniq -d)" ] || bad "two drives have the same custody log."

# --- whose key ---------------------------------------------------------------------------------------------------
if [ -z "$WANT" ]; then
  echo "keys not compared: run sh check.sh KEY-FINGERPRINT with the fingerprint from the mail with the summary."
  [ -n "$LOG_KEY" ] && echo "          fingerprint of the key in this bundle: $LOG_KEY"
elif [ "$WANT" = "$LOG_KEY" ]; then ok "the log key has the fingerprint that you gave"
else bad "the log key has another fingerprint than the one you gave: $LOG_KEY"; fi

if [ "$BAD" -gt 0 ]; then
  echo "$BAD found not to be in order. Keep this bundle as it is and ask the workshop for another."
  exit 1
fi
echo "All in order: $LOGS custody logs, $ENTRIES entries, $(grep -c . "$TMP/present") files."
exit 0
`;
