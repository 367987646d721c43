#!/bin/sh
# npm test: the set-up, then lint, format, types, build and all tests. Every step runs even when an earlier one failed,
# and any failure makes the exit code 1. Arguments go to Vitest: npm test -- tests/server/env.test.ts
set -u
cd "$(dirname "$0")/../.."
. server/setup/prepare.sh

need_node
need_mariadb
need_test_programs
need_modules
# Vitest sets its own; what the caller had must not turn tests into production.
unset NODE_ENV

failed=
step() {
  name=$1
  shift
  say "== $name"
  "$@" || failed="$failed $name"
}
bin=node_modules/.bin
# Without the cache: with rules that know types, a change in one file can make another one wrong.
step lint $bin/eslint .
step format $bin/prettier --check --log-level warn .
step types $bin/vue-tsc --noEmit
step build need_build

say '== tests'
results=$(mktemp)
$bin/vitest run --reporter=default --reporter=json --outputFile.json="$results" "$@"
code=$?
# Prints the closing line and decides the exit code; must stay the last command.
node server/setup/closingLine.mjs "$results" "$code" $failed
code=$?
rm -f "$results"
exit $code
