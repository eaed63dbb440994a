#!/bin/sh
# Fails on sources that clang-format 14 would change; skips (77) where it is missing.
# Usage: check_format.sh ROOT
set -eu
cd "$1"
tool=
for name in clang-format-14 clang-format; do
  if command -v "$name" >/dev/null && "$name" --version | grep -q 'version 14\.'; then
    tool=$name
    break
  fi
done
if [ -z "$tool" ]; then
  echo "clang-format 14 is missing: layout not checked"
  exit 77
fi
wrong=$(find src include tests \( -name '*.cpp' -o -name '*.hpp' -o -name '*.c' -o -name '*.h' \) \
  -print0 | xargs -0 "$tool" --dry-run 2>&1 | sed -n 's/^\([^: ]*\):[0-9].*/\1/p' | sort -u)
if [ -n "$wrong" ]; then
  echo "clang-format 14 would change (mend with $tool -i):"
  echo "$wrong"
  exit 1
fi
echo "layout as clang-format 14 sets it"
