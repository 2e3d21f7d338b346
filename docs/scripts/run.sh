#!/usr/bin/env bash
# Runs a problem from the coefficient file to the best assignment, with curl alone.
#
#   ESPALIER_URL             address of the server, http://127.0.0.1:3000 where nothing is said
#   ESPALIER_TOKEN           a token with the role developer: People, Tokens
#   ESPALIER_REVIEWER_TOKEN  a token of another person, with the role reviewer: nobody approves a run sheet of their own
#   RUN_SHEET                an approved run sheet to go on with, where there is no such token
set -euo pipefail

url=${ESPALIER_URL:-http://127.0.0.1:3000}
token=${ESPALIER_TOKEN:?make a token with the role developer under People, Tokens}

# Asks as the developer: METHOD PATH and what else curl takes. A key of its own makes it safe to ask again.
ask() {
  local method=$1 path=$2
  shift 2
  curl --silent --show-error --fail-with-body --retry 3 --request "$method" "$url$path" \
    --header "Authorization: Bearer $token" --header "Idempotency-Key: $(od -An -N16 -tx1 /dev/urandom | tr -d ' \n')" "$@"
}
json() { ask "$1" "$2" --header 'Content-Type: application/json' --data "$3"; }

# The first field of this name in a JSON answer.
field() { grep -o "\"$1\" *: *\"[^\"]*\"" | head -n 1 | sed 's/.*: *"\(.*\)"$/\1/'; }

wait_for() {
  local status
  while status=$(ask GET "/api/jobs/$1" | field status); [ "$status" = queued ] || [ "$status" = running ]; do
    sleep 0.3
  done
  [ "$status" = done ] || { echo "The job is $status." >&2; exit 1; }
}

folder=$(mktemp -d)
trap 'rm -rf "$folder"' EXIT

sheet=${RUN_SHEET:-}
if [ -z "$sheet" ]; then
  # A ring of eight spins that want to differ from their neighbours, and two that want to agree across it.
  for i in 0 1 2 3 4 5 6 7; do echo "s$i s$(((i + 1) % 8)) 1"; done >"$folder/ring.txt"
  echo "s0 s4 -0.5" >>"$folder/ring.txt"
  problem=$(ask POST /api/problems --form "file=@$folder/ring.txt" --form form=ising --form 'name=Ring of eight' | field id)
  machine=$(ask GET '/api/machines?limit=1' | field id)
  started=$(json POST /api/embeddings "{\"problemId\":\"$problem\",\"machineId\":\"$machine\"}")
  wait_for "$(field jobId <<<"$started")"
  embedding=$(field id <<<"$started")
  sheet=$(json POST /api/run-sheets "{\"embeddingId\":\"$embedding\",\"name\":\"By script\",\"reads\":100}" | field id)
  json POST "/api/run-sheets/$sheet/submit" '{"remark":"Prepared by a script."}' >"$folder/submitted"
  if [ -z "${ESPALIER_REVIEWER_TOKEN:-}" ]; then
    echo "A reviewer decides at $url/run-sheets/$sheet. Once it is approved: RUN_SHEET=$sheet $0"
    exit 0
  fi
  token=$ESPALIER_REVIEWER_TOKEN json POST "/api/run-sheets/$sheet/approve" '{}' >"$folder/approved"
fi
json POST "/api/run-sheets/$sheet/issue" '{}' >"$folder/issued"

# The programmed values, a line each: two qubits and a coupling, or one qubit twice and its field.
ask GET "/api/run-sheets/$sheet/programmed?format=csv" >"$folder/programmed.csv"

# What the machine would do: here 100 descents from random spins, each by single flips that lower the energy.
awk -F, -v reads=100 '
  BEGIN { srand(1) }
  !/^[0-9]+,/ { next }
  { for (side = 1; side <= 2; side++) if (!($side in near)) { near[$side] = ""; order[++n] = $side } }
  $1 == $2 { h[$1] = $3; next }
  { J[$1, $2] = J[$2, $1] = $3; near[$1] = near[$1] " " $2; near[$2] = near[$2] " " $1 }
  END {
    for (i = 1; i <= n; i++) printf "%s%s", order[i], i < n ? "," : "\n"
    for (read = 0; read < reads; read++) {
      for (i = 1; i <= n; i++) s[order[i]] = rand() < 0.5 ? -1 : 1
      do {
        flips = 0
        for (i = 1; i <= n; i++) {
          q = order[i]; pull = h[q]; count = split(near[q], others, " ")
          for (k = 1; k <= count; k++) pull += J[q, others[k]] * s[others[k]]
          if (pull * s[q] > 1e-12) { s[q] = -s[q]; flips++ }
        }
      } while (flips > 0)
      for (i = 1; i <= n; i++) printf "%d%s", s[order[i]], i < n ? "," : "\n"
    }
  }' "$folder/programmed.csv" >"$folder/samples.csv"

returned=$(ask POST "/api/run-sheets/$sheet/returns" --form "file=@$folder/samples.csv" | field id)
ask GET "/api/returns/$returned/solutions?format=csv&limit=1"
