/** The custody log of each drive, against itself, the files and the record of the case. */
export const LOGS = String.raw`
# --- the case as recorded: one line for each fact that a log can speak to ------------------------------------------
awk '
  { value = $0; sub(/^ *"[a-zA-Z0-9]*": "?/, "", value); sub(/"?,?$/, "", value) }
  /^  "ref": / { print "ref 0 " value }
  /^      "number": / { drive = value }
  /^      "id": / { print "drive " drive " " value }
  /^        "seq": / { seq = value }
  /^        "hash": / { print "upto " drive " " seq " " value }
  /^ *"path": / { path = value; id = ""; digest = "" }
  /^ *"id": / { id = value; fresh = NR }
  /^ *"sha256": / {
    if (path != "" && id != "") { print "read " drive " " id " " value; print "file " drive " " value " " path; path = "" }
    else if (fresh == NR - 1) { print "approval " drive " " id " " value; approval = id }
  }
  /^ *"revoked": \{/ { print "revoked " drive " " approval }
' data/case.json >"$TMP/record" 2>/dev/null || bad "data/case.json is missing."
CASE=$(sed -n 's/^ref 0 //p' "$TMP/record")
told_of() { sed -n "s/^$1 $2 //p" "$TMP/record" | sort; } # kind, drive

# --- the custody log of each drive -------------------------------------------------------------------------------
check_log() { # number of the drive
  log=data/drives/$1/custody
  at=$TMP/drive$1
  before=$BAD
  LOGS=$((LOGS + 1))
  split_log "$log" "$at" || return
  (cd "$at/line" && awk -v n="$COUNT" 'BEGIN { for (i = 1; i <= n; i++) print i }' | xargs sha256sum) | cut -c1-64 >"$at/hashes"
  sed -e 's/^{"action":"[a-z.-]*","actor":{.*},"app":".*","at":"\([0-9-]\{10\}T[0-9:.]\{15\}Z\)","drive":"\([0-9a-f-]*\)","facts":{.*},"prev":"\([0-9a-f]\{64\}\)","seq":\([0-9][0-9]*\),"subject":{"id":"[0-9a-f-]*","type":"[a-z]*"},"v":1}$/\3 \4 \1 \2/' -e t -e 's/.*/unreadable 0 0 0/' "$log.jsonl" >"$at/links"
  awk 'NR == FNR { hash[FNR] = $1; next }
    FNR == 1 { want = "0000000000000000000000000000000000000000000000000000000000000000"; time = "" }
    { if ($1 == "unreadable") print "entry " FNR " is not of the form twinread-custody/1."
      else { if (($2 "") != (FNR "")) print "entry " FNR " has the number " $2 "."
        if (($1 "") != (want "")) print "entry " FNR " does not follow from the line before: a line was cut, moved, put in or changed."
        if (($3 "") < (time "")) print "entry " FNR " claims a time before the one before it."
        time = $3 }
      want = hash[FNR] }' "$at/hashes" "$at/links" >"$at/breaks"
  each_bad "$at/breaks" "$log.jsonl: "
  grep -n '[{,]"headBehind":[0-9]' "$log.jsonl" | sed 's/:.*//' >"$at/behind"
  each_bad "$at/behind" "$log.jsonl: the log's head had been turned back when this entry was written: "
  n=0
  newest=0
  while read -r key signature; do
    n=$((n + 1))
    [ -f "$at/signed/$n" ] || break
    if [ ! -f "$TMP/keys/$key" ]; then bad "$log.jsonl: entry $n is signed with a key that nobody introduced."
    elif ! holds "$key" "$signature" "$at/signed/$n"; then bad "$log.jsonl: the signature of entry $n does not fit it."
    else
      read -r place <"$TMP/order/$key"
      if [ "$place" -lt "$newest" ]; then bad "$log.jsonl: entry $n is signed with a key that had been replaced by then."
      else newest=$place; fi
    fi
  done <"$log.sig"
  cut -d ' ' -f 4 "$at/links" | sort -u >"$at/chain"
  [ "$(grep -c . "$at/chain")" -eq 1 ] || bad "$log.jsonl holds entries of more than one log."
  cat "$at/chain" >>"$TMP/chains"
  case $(tail -n 1 "$log.jsonl") in
    '{"action":"bundle.started",'*) ;;
    *) bad "$log.jsonl does not end with the start of this bundle: its end was cut, or something was added." ;;
  esac
  ref='"read":{"id":"[0-9a-f-]*","number":\([0-9]*\),"stage":"\([a-z]*\)"}'
  sha='"\([0-9a-f]\{64\}\)"'
  sed -n -e 's/^{"action":"read\.stored",.*'"$ref"',.*,"sha256":'"$sha"',"sizeBytes":.*/\3 \2-\1.bin/p' \
    -e 's/^{"action":"composite\.made",.*'"$ref"',.*,"sha256":'"$sha"',"sizeBytes":.*/\3 \2-\1.bin/p' "$log.jsonl" >"$at/images"
  sed -n -e 's/^{"action":"composite\.made",.*'"$ref"',.*,"reportSha256":'"$sha"',.*/\3 \2-\1-votes.json/p' \
    -e 's/^{"action":"read\.stored",.*"format":"intel-hex",.*'"$ref"',.*,"source":{[^{}]*"fileSha256":'"$sha"'.*/\3 \2-\1.hex/p' \
    -e 's/^{"action":"read\.stored",.*"format":"s-record",.*'"$ref"',.*,"source":{[^{}]*"fileSha256":'"$sha"'.*/\3 \2-\1.srec/p' "$log.jsonl" | cat "$at/images" - | sort >"$at/told"
  sed -n "s,^\([0-9a-f]\{64\}\)  data/drives/$1/[^/]*/\([^/]*\)\$,\1 \2,p" manifest-sha256.txt | grep -e '\.bin$' -e '\.hex$' -e '\.srec$' -e '-votes\.json$' | sort >"$at/kept"
  sed -n -e 's/^{"action":"image\.erased",.*[{,]"sha256":'"$sha"'.*/\1 erased/p' -e 's/^{"action":"image\.found-sound",.*[{,]"sha256":'"$sha"'.*/\1 sound/p' "$log.jsonl" |
    awk '{ word[$1] = $2 } END { for (sha in word) if (word[sha] == "erased") print sha }' | sort >"$at/erased"
  comm -23 "$at/told" "$at/kept" | without_erased >"$at/missing"
  each_bad "$at/missing" "$log.jsonl names an image that the bundle does not hold: "
  comm -13 "$at/told" "$at/kept" >"$at/unknown"
  each_bad "$at/unknown" "drive $1 has an image that its custody log does not name: "
  check_photos "$1"
  check_record "$1"
  ENTRIES=$((ENTRIES + COUNT))
  if [ "$BAD" -eq "$before" ]; then
    ok "drive $1: $COUNT entries, each following from the one before, each signed; $(grep -c . "$at/told") images, each as the log and the record name it"
    [ -s "$at/erased" ] && ok "drive $1: of its images and photos $(grep -c . "$at/erased") were erased, as its log says"
    echo "          head of this log: $COUNT $(tail -n 1 "$at/hashes")"
  fi
}
# Lines that begin with the digest of an image that the log says was erased, and not stored again since, are left out.
without_erased() { awk 'FILENAME == ARGV[1] { gone[$1] = 1; next } !($1 in gone)' "$at/erased" -; }
# The same, unless a file lies under the path at the line's end: then it is another one than the record gives.
absent_erased() { awk 'FILENAME == ARGV[1] { gone[$1] = 1; next } FILENAME == ARGV[2] { there[$1] = 1; next } !($1 in gone) || ($2 in there)' "$at/erased" "$at/paths" -; }
# Photos of the drive, its boards and chips, but for those that the log says were lost or erased. Others stand in other logs.
check_photos() { # number of the drive
  sed -n 's/^{"action":"photo\.added",.*,"of":{.*,"type":"\([a-z-]*\)"},"photo":"[0-9a-f-]*","sha256":'"$sha"',"sizeBytes":.*/\1 \2/p' "$log.jsonl" |
    sed -n -e 's/^drive //p' -e 's/^board //p' -e 's/^chip //p' | sort >"$at/phototold"
  sed -n "s,^\([0-9a-f]\{64\}\)  data/drives/$1/photos/\([^/]*\)\$,\1 \2,p" manifest-sha256.txt | grep -v '\.shelf-[0-9][0-9]*\.[a-z]*$' | cut -c1-64 | sort >"$at/photokept"
  sed -n 's/^{"action":"image\.found-damaged",.*"sha256":'"$sha"'.*/\1/p' "$log.jsonl" | sort -u >"$at/lost"
  comm -23 "$at/phototold" "$at/photokept" | grep -vxF -f "$at/lost" | without_erased >"$at/photomissing"
  each_bad "$at/photomissing" "$log.jsonl names a photo that the bundle does not hold: "
  comm -13 "$at/phototold" "$at/photokept" >"$at/photounknown"
  each_bad "$at/photounknown" "drive $1 has a photo that its custody log does not name: "
}
# The record says the same as the log: whose it is, how far it goes, which reads and approvals.
check_record() { # number of the drive
  [ "$(told_of drive "$1")" = "$(cat "$at/chain")" ] || bad "data/case.json: drive $1 is another one than its log says."
  [ "$(told_of upto "$1")" = "$COUNT $(tail -n 1 "$at/hashes")" ] || bad "data/case.json: the log of drive $1 ends elsewhere than it says."
  started=$(tail -n 1 "$log.jsonl" | sed -n 's/^{"action":"bundle\.started",.*"facts":{\(.*[{,]\)\{0,1\}"caseRef":"\([^"]*\)",.*/\2/p')
  [ "$started" = "$CASE" ] || bad "data/case.json: the log of drive $1 starts a bundle of another case."
  subject='"subject":{"id":"\([0-9a-f-]*\)","type":"[a-z]*"},"v":1}$'
  sed -n -e 's/^{"action":"read\.stored",.*,"sha256":'"$sha"',"sizeBytes":.*,'"$subject"'/\2 \1/p' \
    -e 's/^{"action":"composite\.made",.*,"sha256":'"$sha"',"sizeBytes":.*,'"$subject"'/\2 \1/p' "$log.jsonl" | sort >"$at/reads"
  sed -n 's/^{"action":"approval\.given",.*[{,]"sha256":'"$sha"'.*,'"$subject"'/\2 \1/p' "$log.jsonl" | sort >"$at/approvals"
  sed -n 's/^{"action":"approval\.revoked",.*,'"$subject"'/\1/p' "$log.jsonl" | sort -u >"$at/revoked"
  for kind in read approval revoked; do
    told_of "$kind" "$1" >"$at/said"
    case $kind in read) list=$at/reads ;; approval) list=$at/approvals ;; revoked) list=$at/revoked ;; esac
    cmp -s "$at/said" "$list" || bad "data/case.json: drive $1 has other entries of the kind \"$kind\" than its log."
  done
  told_of file "$1" >"$at/said"
  sed 's/^\(.\{64\}\)  /\1 /' manifest-sha256.txt | sort >"$at/listed"
  awk '{ print $2 }' "$at/listed" | sort >"$at/paths"
  comm -23 "$at/said" "$at/listed" | absent_erased >"$at/off"
  each_bad "$at/off" "data/case.json names an image that the bundle does not hold: "
}
: >"$TMP/chains"
for folder in data/drives/*/; do
  [ -d "$folder" ] || continue
  number=$(basename "$folder")
  case $number in
    *[!0-9]* | 0* | ??????*) bad "data/drives/$number is no folder of a drive." ;;
    *) check_log "$number" ;;
  esac
done
n=1
while [ "$n" -le "$LOGS" ]; do
  [ -d "data/drives/$n" ] || bad "the drives are not counted from 1 without a gap: $n is missing."
  n=$((n + 1))
done
[ "$LOGS" -gt 0 ] || bad "there is no drive in this bundle."
[ "$(grep -c '^drive ' "$TMP/record")" -eq "$LOGS" ] || bad "data/case.json has another number of drives than the bundle has logs."
grep -q '^data/drives/[^/]*$' "$TMP/present" && bad "a file lies in no drive's folder."
[ -z "$(sort "$TMP/chains" | uniq -d)" ] || bad "two drives have the same custody log."
`;
