#!/usr/bin/env bash
# Kills a foreground run with SIGKILL at random moments and checks, each time, that every acknowledged reading is in the file,
# that the file verifies, and that it says the run was cut.
#
#   bash tests/campaigns/kill-run.sh [COUNT] [SEED]
#
# Build first: dotnet build -c Release src/Acquire.App
set -euo pipefail
cd "$(dirname "$0")/../.."
count=${1:-50}
RANDOM=${2:-1}
acquire=src/Acquire.App/bin/Release/net10.0/acquire
protocol=protocols/germanium-quick.protocol.yaml
bench=simulator/germanium-quick.bench.yaml
folder=$(mktemp -d)
export XDG_RUNTIME_DIR="$folder" XDG_STATE_HOME="$folder" NO_COLOR=1
trap 'for note in "$folder"/acquire/simulators/*.pid; do [ -f "$note" ] && kill "$(cat "$note")" 2>/dev/null; done; rm -rf "$folder"' EXIT

sound=0
lost=0
for i in $(seq 1 "$count"); do
  run="$folder/run-$i.run"
  "$acquire" run "$protocol" --bench "$bench" --foreground --out "$run" --operator "campaign" >"$folder/out" 2>"$folder/err" &
  process=$!
  # 1.5 s to 12 s: start-up, ramp, soak and measuring all get their share.
  sleep "$(printf '%d.%03d' $((1 + RANDOM % 11)) $((RANDOM % 1000)))"
  kill -9 "$process" 2>/dev/null || true
  wait "$process" 2>/dev/null || true
  [ -f "$run" ] || { echo "$i: killed before the file existed"; continue; }
  acknowledged=$(sed -nE 's/.*on disk ([0-9]+).*/\1/p' "$folder/out" | tail -n 1)
  json=$("$acquire" verify "$run" --json) || { echo "$i: verify says no: $json"; lost=$((lost + 1)); continue; }
  readings=$(printf '%s' "$json" | sed -nE 's/.*"readings": *([0-9]+).*/\1/p')
  printf '%s' "$json" | grep -q '"state": *"[^"]*cut' || { echo "$i: the file does not say that the run was cut: $json"; lost=$((lost + 1)); continue; }
  if [ "${readings:-0}" -lt "${acknowledged:-0}" ]; then
    echo "$i: $readings readings in the file, $acknowledged were acknowledged"
    lost=$((lost + 1))
    continue
  fi
  sound=$((sound + 1))
done
echo "$count kills: $sound sound, $lost not"
[ "$lost" -eq 0 ]
