#!/usr/bin/env bash
# Opens a faulty note in Neovim: what its built-in client shows must be what review says.
set -euo pipefail
cd "$(dirname "$0")"
. ../../common/lib.sh
prepare
export HOME=$work XDG_CONFIG_HOME=$work/config XDG_DATA_HOME=$work/data XDG_STATE_HOME=$work/state

version=$(nvim --version | sed -n '1s/NVIM v//p')
timeout 60 nvim --headless -u init.lua "$INKJOULE_NOTE" -c 'luafile dump.lua' >"$work/nvim.log" 2>&1 || true
compare_dumps "Neovim $version" "$work/nvim.log"

# On the screen of a terminal: the value and the finding stand in the text.
start_screen "nvim -u init.lua '$INKJOULE_NOTE'"
value=$(first_value)
check "Neovim on the screen: $value" wait_for 15 on_screen "$value"
check "Neovim on the screen: the finding in line $(first_finding line)" wait_for 15 on_screen_line "$(first_finding text)" "$(first_finding message)"
screen_shot neovim
send_keys Escape ':qa!' Enter
check "Neovim ends, and its server with it" wait_for 5 server_gone
finish
