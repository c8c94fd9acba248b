#!/usr/bin/env bash
# Runs check.vim in a real Vim, with ALE as the client where the distribution has it, against the server of this
# repository. Not a part of the tests: run it by hand after a change here.
set -euo pipefail
here=$(cd "$(dirname "${BASH_SOURCE[0]}")" && pwd)
root=$(cd "$here/../.." && pwd)
target="${CARGO_TARGET_DIR:-$root/target}"
work="$target/editors/vim"

if [ -z "${LAYSHAFT:-}" ]; then
    (cd "$root" && cargo build --quiet --profile test -p layshaft)
    LAYSHAFT="$target/debug/layshaft"
fi
ale="${ALE:-/usr/share/vim-ale}"
if [ ! -d "$ale" ]; then
    echo "no ALE at $ale: colours and indentation alone (apt-get install vim-nox vim-ale, or ALE=its folder)"
    ale=
fi
rm -rf "$work"
mkdir -p "$work/specs" "$work/bin"
cp "$root/tests/specs/mill-hoist.shaft" "$work/specs/"
ln -s "$(readlink -f "$LAYSHAFT")" "$work/bin/layshaft"
PATH="$work/bin:$PATH" vim -N -u "$here/check.vim" -i NONE -n -es --cmd "let g:ale = '$ale'" \
    --cmd "let g:spec = '$work/specs/mill-hoist.shaft'" --cmd "let g:out = '$work/seen'" </dev/null || failed=1
cat "$work/seen"
exit "${failed:-0}"
