#!/usr/bin/env bash
# Makes the page: `build.sh FOLDER [WORK]` writes all its files into FOLDER, from
# where any web server can hand them out (.wasm as application/wasm). Wants Go, and
# npm with its registry for the packages of page/package-lock.json. WORK, when named,
# keeps the page's sources with those packages.
set -euo pipefail
here=$(cd "$(dirname "$0")" && pwd)
root=$(cd "$here/../.." && pwd)
dist=${1:?usage: build.sh FOLDER [WORK]}
mkdir -p "$dist"
dist=$(cd "$dist" && pwd)
work=${2-}
if [ -z "$work" ]; then
	work=$(mktemp -d)
	trap 'rm -rf "$work"' EXIT
fi
mkdir -p "$work"

GOOS=js GOARCH=wasm go build -C "$here" -trimpath -ldflags='-s -w' -o "$dist/foulcase.wasm" .
cp "$(go env GOROOT)/lib/wasm/wasm_exec.js" "$dist/"

cp -r "$here/page/." "$work/"
(cd "$work" && npm ci --ignore-scripts --no-audit --no-fund --silent && npm run --silent bundle -- --outfile="$dist/page.js")
(cd "$here/page" && cp index.html style.css worker.js offline.js icon.svg "$dist/")

# The model is fetched by its hash, so that a browser keeps it until it changes.
model=$root/lm/english/english.fcm
sum=$(sha256sum "$model" | cut -d' ' -f1)
cp "$model" "$dist/english-${sum:0:16}.fcm"
printf '{"file": "english-%s.fcm", "bytes": %d, "sha256": "%s"}\n' \
	"${sum:0:16}" "$(wc -c <"$model")" "$sum" >"$dist/model.json"
