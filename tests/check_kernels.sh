#!/bin/sh
# Fails when a kernel object defines a function that the linker may share with other objects: the
# copy for a newer instruction set could then be run on a machine without it.
# Usage: check_kernels.sh OBJECT…
set -eu
shared=$(nm -C --defined-only "$@" | grep -E '^[0-9a-f]+ [WVu] ' | grep -v 'DW\.ref\.' || true)
if [ -n "$shared" ]; then
  echo "kernels must inline all they use; these could leak into other code:"
  echo "$shared"
  exit 1
fi
echo "kernels keep to themselves"
