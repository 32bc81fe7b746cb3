#!/usr/bin/env bash
# Speaks to the language server by the protocol library that editors use; see ../check.mjs.
set -euo pipefail
cd "$(dirname "$0")"
. ../../common/lib.sh
prepare
count node ../check.mjs "$INKJOULE" "$INKJOULE_NOTE"
check "client: no server is left" wait_for 5 server_gone
finish
