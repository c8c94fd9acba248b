#!/usr/bin/env bash
# Tests the grammars for editors with the engines that editors run them in: the TextMate grammar with the one of
# VS Code. What that needs comes into the build folder.
set -euo pipefail
here=$(cd "$(dirname "${BASH_SOURCE[0]}")" && pwd)
root=$(cd "$here/.." && pwd)
target="${CARGO_TARGET_DIR:-$root/target}"
work="$target/grammar"

mkdir -p "$work"
if ! cmp -s "$here/test/package-lock.json" "$work/installed.json"; then
    cp "$here/test/package.json" "$here/test/package-lock.json" "$work/"
    (cd "$work" && npm ci --silent --ignore-scripts --no-audit --no-fund)
    cp "$work/package-lock.json" "$work/installed.json"
fi
echo "-- TextMate"
NODE_PATH="$work/node_modules" node "$here/test/scopes.cjs" "$root"/tests/specs/*.shaft
