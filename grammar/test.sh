#!/usr/bin/env bash
# Tests the grammars for editors with the engines that editors run them in: the TextMate grammar with the one of
# VS Code, the tree-sitter grammar with its own command. What that needs comes into the build folder.
# usage: test.sh [textmate | tree-sitter | bless]
#   bless writes the tree-sitter parser and the trees of its tests anew: look at what changed.
set -euo pipefail
shopt -s nullglob
export NO_COLOR=1
here=$(cd "$(dirname "${BASH_SOURCE[0]}")" && pwd)
root=$(cd "$here/.." && pwd)
target="${CARGO_TARGET_DIR:-$root/target}"
work="$target/grammar"
TREE_SITTER=0.27.1
mkdir -p "$work"

textmate() {
    if ! cmp -s "$here/test/package-lock.json" "$work/installed.json"; then
        cp "$here/test/package.json" "$here/test/package-lock.json" "$work/"
        (cd "$work" && npm ci --silent --ignore-scripts --no-audit --no-fund)
        cp "$work/package-lock.json" "$work/installed.json"
    fi
    NODE_PATH="$work/node_modules" node "$here/test/scopes.cjs" "$root"/tests/specs/*.shaft
}

# The command without its own JavaScript engine: node is here. Debug, since it is built once and used for seconds.
install_tree_sitter() {
    if ! "$work/bin/tree-sitter" --version 2>/dev/null | grep -qF "$TREE_SITTER"; then
        cargo install tree-sitter-cli --version "$TREE_SITTER" --locked --no-default-features --debug --quiet \
            --root "$work" --target-dir "$work/build"
        rm -rf "$work/build"
    fi
}

# In a copy, so that nothing appears among the sources. Its cache is its own, since a user may have one.
tree_sitter() {
    (cd "$work/tree-sitter" && XDG_CACHE_HOME="$work/cache" "$work/bin/tree-sitter" "$@")
}

copy_grammar() {
    rm -rf "$work/tree-sitter"
    cp -r "$here/tree-sitter" "$work/tree-sitter"
    printf '{ "parser-directories": [] }\n' >"$work/tree-sitter.json"
}

generated_is_committed() {
    tree_sitter generate
    local file
    for file in parser.c grammar.json node-types.json; do
        cmp "$here/tree-sitter/src/$file" "$work/tree-sitter/src/$file" || {
            echo "$file is not what grammar.js gives: bash grammar/test.sh bless"
            return 1
        }
    done
}

# Every spec and every example of the documentation, but those that show broken syntax.
specs_are_read() {
    node "$here/test/examples.cjs" "$work/examples" "$root"/README.md "$here"/*.md "$here"/kinds/*.md \
        "$root"/crates/diagnostics/pages/*.md
    (cd "$work/examples" && rm -f {bad-name,bad-number,bad-text,syntax,unclosed-bracket,duplicate-syntax}-*-wrong.shaft)
    find "$work/examples" "$root/tests/specs" "$root/crates/layshaft/src" -name '*.shaft' | sort >"$work/specs.txt"
    tree_sitter parse --quiet --config-path "$work/tree-sitter.json" --paths "$work/specs.txt"
    echo "$(wc -l <"$work/specs.txt") specs read without an error"
}

# The queries of editors that keep their own. One that names what the grammar has not is refused.
queries_fit() {
    local query count=0
    for query in "$here"/tree-sitter/queries/*.scm "$root"/editors/*/queries/shaft/*.scm \
        "$root"/editors/*/languages/shaft/*.scm; do
        tree_sitter query --quiet --config-path "$work/tree-sitter.json" "$query" "$root/tests/specs/mill-hoist.shaft"
        count=$((count + 1))
    done
    echo "$count queries fit the grammar"
}

case "${1:-all}" in
    bless)
        install_tree_sitter
        copy_grammar
        tree_sitter generate
        cp -r "$work/tree-sitter/src/." "$here/tree-sitter/src/"
        tree_sitter test --update --config-path "$work/tree-sitter.json" || true
        cp -r "$work/tree-sitter/test/." "$here/tree-sitter/test/"
        ;;
    textmate) textmate ;;
    tree-sitter | all)
        [ "${1:-all}" = tree-sitter ] || textmate
        install_tree_sitter
        copy_grammar
        generated_is_committed
        tree_sitter test --config-path "$work/tree-sitter.json"
        specs_are_read
        queries_fit
        ;;
    *)
        sed -n '4,5s/^# //p' "$0" >&2
        exit 2
        ;;
esac
