#!/usr/bin/env bash
# Runs layshaft-test.el in a real Emacs with the server of this repository. Emacs comes from the distribution where it
# is missing.
set -euo pipefail
here=$(cd "$(dirname "${BASH_SOURCE[0]}")" && pwd)
root=$(cd "$here/../.." && pwd)
target="${CARGO_TARGET_DIR:-$root/target}"
work="$target/editors/emacs"

if [ -z "${LAYSHAFT:-}" ]; then
    (cd "$root" && cargo build --quiet --profile test -p layshaft)
    LAYSHAFT="$target/debug/layshaft"
fi
if ! command -v emacs >/dev/null; then
    apt-get update -qq
    DEBIAN_FRONTEND=noninteractive apt-get install -y -qq --no-install-recommends emacs-nox elpa-eglot >/dev/null
fi

# A copy, since an editor may write.
rm -rf "$work"
mkdir -p "$work/specs" "$work/bin" "$work/home"
cp "$root/tests/specs/mill-hoist.shaft" "$work/specs/"
cp "$here"/*.el "$work/"
ln -s "$(readlink -f "$LAYSHAFT")" "$work/bin/layshaft"
export PATH="$work/bin:$PATH" HOME="$work/home"
# Warnings of the compiler are errors.
emacs -Q --batch --eval '(setq byte-compile-error-on-warn t)' -f batch-byte-compile "$work/layshaft-mode.el"
emacs -Q --batch -l "$work/layshaft-test.el" "$work/specs/mill-hoist.shaft"
