#!/usr/bin/env bash
# Runs the tests that drive real editors: a line per check, and a closing line
# 'N passed, N failed'. Needs editors/setup.sh; pictures go to $INKJOULE_ARTEFACTS.
#
# Usage: editors/test.sh [client] [neovim] [vim] [emacs] [kate] [vscode]     (default: all)
set -euo pipefail
cd "$(dirname "$0")"
. common/lib.sh

work_dir
build_binary
export INKJOULE_BIN=$INKJOULE     # one build for all
for name in "${@:-client neovim vim emacs kate vscode}"; do
    for editor in $name; do
        [ -x "$editor/test/run.sh" ] || die "test.sh knows client, neovim, vim, emacs, kate and vscode, not '$editor'"
        start=$SECONDS
        count "$editor/test/run.sh"
        echo "-- $editor: $((SECONDS - start)) s"
    done
done
finish
