/** The seal, the way from each log's end to its root (RFC 9162, section 2.1), and whose keys they are. */
export const SEAL = String.raw`
# --- the seal ----------------------------------------------------------------------------------------------------
octal() { # hex digits as the octal escapes of printf
  echo "$1" | awk '{ h = "0123456789abcdef"; for (i = 1; i < length($0); i += 2) printf "\\0%03o", (index(h, substr($0, i, 1)) - 1) * 16 + index(h, substr($0, i + 1, 1)) - 1 }'
}
node_hash() { printf '%b' "\\0001$(octal "$1")$(octal "$2")" | sha256sum | cut -c1-64; }
root_from() { # hash of the leaf, its index, number of leaves; the path stands in $TMP/path, lowest first
  r=$1
  fn=$2
  sn=$(($3 - 1))
  [ "$fn" -le "$sn" ] || return 1
  while read -r p; do
    [ "$sn" -gt 0 ] || return 1
    if [ $((fn % 2)) -eq 1 ] || [ "$fn" -eq "$sn" ]; then
      r=$(node_hash "$p" "$r")
      while [ $((fn % 2)) -eq 0 ] && [ "$fn" -ne 0 ]; do fn=$((fn / 2)); sn=$((sn / 2)); done
    else r=$(node_hash "$r" "$p"); fi
    fn=$((fn / 2))
    sn=$((sn / 2))
  done <"$TMP/path"
  [ "$sn" -eq 0 ]
}
field() { sed -n "$1p" data/seal/seal.txt; }
whole_number() { case $1 in 0 | [1-9]*) [ "$(printf '%s' "$1" | tr -d '0-9')" = "" ] && [ "$(printf '%s' "$1" | wc -c)" -le 10 ] ;; *) return 1 ;; esac; }
check_seal() {
  before=$BAD
  for part in seal.txt seal.sig seal-key.pem proof.json; do [ -f "data/seal/$part" ] || { bad "data/seal/$part is missing."; return; }; done
  {
    echo twinread-seal/1
    field 2 | grep '^[1-9][0-9]\{0,9\}$'
    field 3 | grep '^[0-9]\{4\}-[0-9][0-9]-[0-9][0-9]T[0-9][0-9]:[0-9][0-9]:[0-9][0-9]\(\.[0-9]\{1,6\}\)\{0,1\}Z$'
    field 4 | grep -e '^0$' -e '^[1-9][0-9]\{0,9\}$'
    field 5 | grep '^[0-9a-f]\{64\}$'
    field 6 | grep '^[0-9a-f]\{64\}$'
  } >"$TMP/seal"
  cmp -s "$TMP/seal" data/seal/seal.txt || { bad "data/seal/seal.txt is not a seal twinread-seal/1 to the letter."; return; }
  SEAL_KEY=$(key_id data/seal/seal-key.pem) || { SEAL_KEY=; bad "data/seal/seal-key.pem is not an Ed25519 public key."; return; }
  if [ ! -f "$TMP/sealkeys/$SEAL_KEY" ]; then bad "data/seal/seal-key.pem is not among the seal keys that the workshop's log introduces."
  elif [ "$SEAL_KEY" != "$NEWEST_SEAL" ]; then bad "data/seal/seal-key.pem was replaced before this bundle was made."; fi
  verify data/seal/seal-key.pem data/seal/seal.txt data/seal/seal.sig || bad "the signature data/seal/seal.sig does not fit the seal."
  [ "$BAD" -eq "$before" ] && ok "seal $(field 2) of $(field 3) is signed by a seal key that the workshop's log introduces"
  before=$BAD
  whole='^{"chains":\([0-9]*\),"format":"twinread-proof\/1","proofs":\[\(.*\)\],"seal":\([0-9]*\)}$'
  [ "$(sed -n "s/$whole/\1 \3/p" data/seal/proof.json)" = "$(field 4) $(field 2)" ] || { bad "data/seal/proof.json is not a proof twinread-proof/1 for this seal."; return; }
  sed "s/$whole/\2/" data/seal/proof.json | awk '{ gsub(/\},\{/, "}\n{"); print }' >"$TMP/proofs"
  [ "$(grep -c . "$TMP/proofs")" -eq "$LOGS" ] || bad "data/seal/proof.json has another number of proofs than the bundle has logs."
  for folder in "$TMP"/drive*/; do
    [ -f "$folder/hashes" ] || continue
    prove "$(basename "$folder" | sed 's/^drive//')" "$(cat "$folder/chain")" "$(grep -c . "$folder/hashes")" "$(tail -n 1 "$folder/hashes")"
  done
  [ "$BAD" -eq "$before" ] && ok "the last entry of each of $LOGS logs is under the root of the seal"
}
prove() { # drive, its log, number and hash of its last entry
  one='^{"drive":"\([0-9a-f-]*\)","head":"\([0-9a-f]\{64\}\)","index":\([0-9]*\),"path":\[\([0-9a-f",]*\)\],"seq":\([0-9]*\)}$'
  sed -n "s/$one/\1 \2 \5 \3 \4/p" "$TMP/proofs" | grep "^$2 " >"$TMP/mine"
  [ "$(grep -c . "$TMP/mine")" -eq 1 ] || { bad "data/seal/proof.json does not have one proof for drive $1."; return; }
  read -r chain head seq index path <"$TMP/mine"
  [ "$head $seq" = "$4 $3" ] || bad "data/seal/proof.json: the log of drive $1 ends elsewhere than where the seal saw it."
  whole_number "$index" && whole_number "$seq" || { bad "data/seal/proof.json: drive $1 has a number that is none."; return; }
  printf '%s\n' "$path" | tr ',' '\n' | sed -n 's/^"\([0-9a-f]\{64\}\)"$/\1/p' >"$TMP/path"
  [ "$(awk '{ print (NR > 1 ? "," : "") "\"" $0 "\"" }' "$TMP/path" | tr -d '\n')" = "$path" ] || { bad "data/seal/proof.json: the path of drive $1 is not a list of digests."; return; }
  leaf=$({ printf '\000'; printf '{"drive":"%s","head":"%s","seq":%s}' "$chain" "$head" "$seq"; } | sha256sum | cut -c1-64)
  root_from "$leaf" "$index" "$(field 4)" && [ "$r" = "$(field 5)" ] || bad "data/seal/proof.json: the way from the end of the log of drive $1 does not lead to the root of the seal."
}
SEAL_KEY=
if [ -f data/seal/seal.txt ] || [ -f data/seal/seal.sig ] || [ -f data/seal/seal-key.pem ] || [ -f data/seal/proof.json ]; then check_seal
elif [ -n "$NEWEST_SEAL" ]; then bad "data/seal/seal.txt is missing, and the workshop had a seal key when this bundle was made."
else echo "seal not checked: this bundle carries none, it was made before the workshop sealed its logs."; fi

# --- whose keys --------------------------------------------------------------------------------------------------
if [ -z "$WANT" ]; then
  echo "keys not compared: run sh check.sh KEY-FINGERPRINT with the fingerprint from the mail or the summary."
  [ -n "$LOG_KEY" ] && echo "          fingerprint of the log key in this bundle:  $LOG_KEY"
  [ -n "$SEAL_KEY" ] && echo "          fingerprint of the seal key in this bundle: $SEAL_KEY"
elif [ "$WANT" = "$LOG_KEY" ]; then ok "the log key has the fingerprint that you gave"
elif [ "$WANT" = "$SEAL_KEY" ]; then ok "the seal key has the fingerprint that you gave"
elif [ "$WANT" != "$NEWEST_LOG" ] && [ "$WANT" != "$NEWEST_SEAL" ] && { [ -f "$TMP/keys/$WANT" ] || [ -f "$TMP/sealkeys/$WANT" ]; }; then bad "you gave the fingerprint of a key that was replaced before this bundle was made."
else bad "the keys have another fingerprint than the one you gave: $LOG_KEY $SEAL_KEY"; fi

if [ "$BAD" -gt 0 ]; then
  echo "$BAD found not to be in order. Keep this bundle as it is and ask the workshop for another."
  exit 1
fi
echo "All in order: $LOGS custody logs, $ENTRIES entries, $(grep -c . "$TMP/present") files."
exit 0
`;
