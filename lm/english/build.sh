#!/usr/bin/env bash
# Rebuilds english.fcm from a folder of plain texts (*.txt, a paragraph a line,
# blank lines between documents) and a folder of corrections:
#
#   lm/english/build.sh TEXTS DATA [WORK]
#
# DATA holds train/ (wikipedia-common.tsv, toefl-spell.tsv, typos-mixed.tsv,
# single-edit-counts.tsv) and resource/homophones-cmudict.tsv, as the card
# describes them. The word lists are those of Debian's packages wamerican-huge
# and wbritish-huge (DICT names another folder). What is made on the way is kept
# in WORK, if given; a step whose result is there already is not done again.
# Every tenth document is left out of the models; two thirds of those calibrate them,
# one third is for measuring. Twice gives the same bytes.
set -euo pipefail
if [ $# -lt 2 ]; then
	sed -n '2,/^set/{/^set/d;s/^# \{0,1\}//;p}' "$0"
	exit 2
fi
texts=$(realpath "$1") data=$(realpath "$2")
dict=${DICT:-/usr/share/dict}
if [ $# -gt 2 ]; then
	mkdir -p "$3"
	work=$(realpath "$3")
else
	work=$(mktemp -d)
	trap 'rm -rf "$work"' EXIT
fi
cd "$(dirname "$0")/../.."

[ -e lm/english/english.fcm ] || : >lm/english/english.fcm # what embeds it must compile
go build -o "$work/foulcase" ./cmd/foulcase

if [ ! -e "$work/parts.fcm" ]; then
	"$work/foulcase" model build \
		--text "$texts" \
		--words en-US="$dict/american-english-huge" \
		--words en-GB="$dict/british-english-huge" \
		--pairs "$data/train/wikipedia-common.tsv" \
		--pairs "$data/train/toefl-spell.tsv" \
		--pairs "$data/train/typos-mixed.tsv" \
		--edits "$data/train/single-edit-counts.tsv" \
		--homophones "$data/resource/homophones-cmudict.tsv" \
		-o "$work/parts.fcm"
fi
if [ ! -e "$work/lm.fcm" ]; then
	"$work/foulcase" lm train --lexicon "$work/parts.fcm" --order 4 --size 23MiB \
		--memory 4GiB --hold-out -o "$work/lm.fcm" "$texts"
fi
"$work/foulcase" model build --from "$work/parts.fcm" --from "$work/lm.fcm" \
	--judgement lm/english/judgement.json -o "$work/uncalibrated.fcm"
"$work/foulcase" model calibrate --model "$work/uncalibrated.fcm" --held-out-only --words 300000 \
	--pairs "$data/train/wikipedia-common.tsv" \
	--pairs "$data/train/toefl-spell.tsv" \
	--pairs "$data/train/typos-mixed.tsv" \
	-o "$work/calibration.json" "$texts"
"$work/foulcase" model build --from "$work/uncalibrated.fcm" \
	--calibration "$work/calibration.json" --card lm/english/card.md -o lm/english/english.fcm
"$work/foulcase" model check lm/english/english.fcm
