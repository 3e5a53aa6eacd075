/** The BagIt part: declaration, count, both lists, no file that no list names. */
export const LISTS = String.raw`
# --- files and lists ---------------------------------------------------------------------------------------------
whole_lines() { [ -z "$(tail -c 1 "$1")" ] || bad "$1 does not end with a whole line."; }
printf 'BagIt-Version: 1.0\nTag-File-Character-Encoding: UTF-8\n' | cmp -s - bagit.txt || bad "bagit.txt is missing, or is not the two lines of a BagIt 1.0 bag."
if [ -f bag-info.txt ]; then
  before=$BAD
  whole_lines bag-info.txt
  grep -v '^$' bag-info.txt | grep -qv '^[^:[:space:]][^:]*: ' && bad "bag-info.txt has a line that is not a label, a colon and a value."
  for label in Bagging-Date External-Identifier Payload-Oxum; do
    [ "$(grep -ci "^$label: " bag-info.txt)" -eq 1 ] || bad "bag-info.txt does not give $label exactly once."
  done
  is=$(find data -type f -exec ls -ln {} + 2>/dev/null | awk '{ n++; size += $5 } END { printf "%.0f.%d", size, n }')
  said=$(sed -n 's/^Payload-Oxum: //p' bag-info.txt)
  [ "$said" = "$is" ] || bad "bag-info.txt says that the case has $said (bytes.files), and it has $is."
  [ "$BAD" -eq "$before" ] && ok "the case has $is (bytes.files), as bag-info.txt says"
else bad "bag-info.txt is missing."; fi
check_list() { # list, what it lists
  before=$BAD
  if [ ! -f "$1" ]; then bad "$1 is missing."; return; fi
  whole_lines "$1"
  grep -qv '^[0-9a-f]\{64\}  [A-Za-z0-9._-][A-Za-z0-9._/-]*$' "$1" && bad "$1 has a line that is not digest, two spaces, path."
  cut -c67- "$1" >"$TMP/paths"
  grep -q '\.\.' "$TMP/paths" && bad "$1 names a path outside the bundle."
  grep -q -e '//' -e '/$' -e '^\./' -e '/\./' -e '\./' -e '\.$' "$TMP/paths" && bad "$1 has a path with an empty part, or with a part that is a dot or ends in one."
  sort "$TMP/paths" | uniq -d >"$TMP/twice"
  each_bad "$TMP/twice" "$1 lists twice: "
  sort -u "$TMP/paths" | tr 'A-Z' 'a-z' | sort | uniq -d >"$TMP/twins"
  each_bad "$TMP/twins" "$1 has names that differ only in capitals: "
  sha256sum -c "$1" >"$TMP/sums" 2>&1 || { grep -v ': OK$' "$TMP/sums" >"$TMP/off"; each_bad "$TMP/off" ""; }
  [ "$BAD" -eq "$before" ] && ok "$(grep -c . "$1") $2 have the digests of $1"
}
check_list manifest-sha256.txt "files of the case"
check_list tagmanifest-sha256.txt "other files"
if [ -f manifest-sha256.txt ]; then
  grep -qv '^.\{66\}data/' manifest-sha256.txt && bad "manifest-sha256.txt lists something outside data."
fi
grep -q -e '^.\{66\}data/' -e '^.\{66\}tagmanifest-' tagmanifest-sha256.txt 2>/dev/null && bad "tagmanifest-sha256.txt lists a file of the case, or itself."
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
grep -e '^manifest-' -e '^tagmanifest-' "$TMP/present" | grep -v -e '^manifest-sha256\.txt$' -e '^tagmanifest-sha256\.txt$' -e '^tagmanifest-sha256\.sig$' | grep -v / >"$TMP/lists"
each_bad "$TMP/lists" "a list of a kind that a bundle does not have: "
[ -f fetch.txt ] && bad "the bundle is not self-contained: fetch.txt names files that lie elsewhere."
`;
