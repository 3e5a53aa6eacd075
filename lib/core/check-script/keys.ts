/** The key and what it signs; where the keys come from. */
export const KEYS = String.raw`
# --- the keys and what they sign ---------------------------------------------------------------------------------
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
  whole_lines "$1.jsonl"
  whole_lines "$1.sig"
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

# The first key introduces itself, each later one is signed by the log key that was in use before it.
NEWEST_LOG=
NEWEST_SEAL=
if split_log data/workshop-keys "$TMP/workshop"; then
  before=$BAD
  n=0
  keys=0
  last=0
  while read -r signer signature; do
    n=$((n + 1))
    line=$TMP/workshop/line/$n
    [ -f "$line" ] || break
    at="data/workshop-keys.jsonl, line $n"
    told=$(sed -n 's/^{"action":"key\.introduced",.*,"drive":"00000000-0000-0000-0000-000000000000","facts":{[^{}]*"keyId":"\([0-9a-f]\{64\}\)","publicKeyPem":"[^"]*","purpose":"\([a-z]*\)".*},"prev":"[0-9a-f]\{64\}","seq":\([1-9][0-9]\{0,9\}\),"subject":{[^{}]*},"v":1}$/\1 \2 \3/p' "$line")
    if [ -z "$told" ]; then bad "$at: it does not introduce a key."; continue; fi
    new=$(echo "$told" | cut -d ' ' -f 1)
    purpose=$(echo "$told" | cut -d ' ' -f 2)
    seq=$(echo "$told" | cut -d ' ' -f 3)
    [ "$seq" -gt "$last" ] || bad "$at: its number is not above the one before."
    last=$seq
    sed -n 's/.*"publicKeyPem":"\([-A-Za-z0-9+/= \\]*\)".*/\1/p' "$line" >"$TMP/pem"
    printf '%b' "$(cat "$TMP/pem")" >"$TMP/new.pem"
    if [ "$(key_id "$TMP/new.pem")" != "$new" ]; then bad "$at: the key's id is not its fingerprint."; continue; fi
    if [ "$keys" -eq 0 ]; then
      if [ "$purpose" != log ] || [ "$signer" != "$new" ]; then bad "$at: the first key is not introduced by itself."; continue; fi
      cp "$TMP/new.pem" "$TMP/keys/$new"
    elif [ "$signer" != "$NEWEST_LOG" ]; then
      if [ -f "$TMP/keys/$signer" ]; then bad "$at: a key was introduced by a log key that had been replaced."
      else bad "$at: no signature by a key known before fits it."; fi
      continue
    fi
    if ! holds "$signer" "$signature" "$TMP/workshop/signed/$n"; then
      bad "$at: no signature by a key known before fits it."
      [ "$keys" -eq 0 ] && rm -f "$TMP/keys/$new"
      continue
    fi
    case $purpose in
      log)
        [ -f "$TMP/order/$new" ] || { keys=$((keys + 1)); echo "$keys" >"$TMP/order/$new"; NEWEST_LOG=$new; }
        cp "$TMP/new.pem" "$TMP/keys/$new" ;;
      seal)
        [ -f "$TMP/sealkeys/$new" ] || NEWEST_SEAL=$new
        cp "$TMP/new.pem" "$TMP/sealkeys/$new" ;;
      *) bad "$at: a key for a purpose that is not known." ;;
    esac
  done <data/workshop-keys.sig
  if [ -n "$LOG_KEY" ]; then
    if [ ! -f "$TMP/keys/$LOG_KEY" ]; then bad "data/seal/log-key.pem is not among the keys that the workshop's log introduces."
    elif [ "$LOG_KEY" != "$NEWEST_LOG" ]; then bad "data/seal/log-key.pem was replaced before this bundle was made."; fi
  fi
  [ "$BAD" -eq "$before" ] && ok "the keys are introduced by signed entries of the workshop's log"
fi
`;
