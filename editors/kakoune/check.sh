#!/usr/bin/env bash
# Opens a spec in a real Kakoune, in a terminal that nobody sees, with the server of this repository by kak-lsp. Not a part
# of the tests: run it by hand after a change here. Needs kak, kak-lsp and tmux on the path.
set -euo pipefail
here=$(cd "$(dirname "${BASH_SOURCE[0]}")" && pwd)
root=$(cd "$here/../.." && pwd)
target="${CARGO_TARGET_DIR:-$root/target}"
work="$target/editors/kakoune"

if [ -z "${LAYSHAFT:-}" ]; then
    (cd "$root" && cargo build --quiet --profile test -p layshaft)
    LAYSHAFT="$target/debug/layshaft"
fi
rm -rf "$work"
mkdir -p "$work/specs" "$work/bin" "$work/config/kak" "$work/run"
chmod 700 "$work/run"
cp "$root/tests/specs/mill-hoist.shaft" "$work/specs/"
cp "$here/shaft.kak" "$here/kakrc" "$work/config/kak/"
ln -s "$(readlink -f "$LAYSHAFT")" "$work/bin/layshaft"
export PATH="$work/bin:$PATH" XDG_CONFIG_HOME="$work/config" XDG_RUNTIME_DIR="$work/run" HOME="$work"
export TERM=xterm-256color LANG=C.UTF-8 LC_ALL=C.UTF-8

screen="kak-$$"
failed=0
tmux() { command tmux -L "$screen" "$@"; }
shown() { tmux capture-pane -p "$@"; }
keys() { tmux send-keys "$@"; }
# kak-lsp is told to end before the session: with the terminal alone gone, it and the server would stay.
finish() {
    keys Escape Escape ':lsp-exit' Enter 2>/dev/null || true
    sleep 2
    keys ':kill!' Enter 2>/dev/null || true
    sleep 1
    tmux kill-server 2>/dev/null || true
}
trap finish EXIT

check() {
    local name="$1" pattern="$2" turn
    for turn in $(seq 100); do
        if shown "${@:3}" | grep -qE -- "$pattern"; then
            echo "ok   $name"
            return
        fi
        sleep 0.2
    done
    echo "FAIL $name"
    shown
    failed=1
}

tmux new-session -d -x 130 -y 40 "kak '$work/specs/mill-hoist.shaft'"
check "results at the ends of lines" 'source motor.*1447 rpm'
colour=$'\033''\[[0-9;]*m'
check "colour of a kind" "$colour"'induction_motor'"$colour" -e
check "colour of a unit" '4'"$colour"' '"$colour"'kW' -e
keys '/lift = motor' Enter ':lsp-hover' Enter
check "hover has the numbers" 'plain . 1447 rpm . 23\.55 N·m'
keys Escape '/= 60 kg' Enter 'a' 'g' Escape
check "a broken unit is told" '^[^ ]let block_mass = 60 kgg'
keys 'u'
check "gone when mended" '^ let block_mass = 60 kg '
keys ':buffer *debug*' Enter
sleep 0.5
if shown | grep -iE 'error|no such' | grep -v lsp_debug; then
    echo "FAIL no error in the debug buffer"
    failed=1
else
    echo "ok   no error in the debug buffer"
fi
exit "$failed"
