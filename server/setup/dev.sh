#!/bin/sh
# npm run dev: the server started again at every change, the client reloaded in place, and a mail fake that keeps its
# mail meanwhile. Open http://localhost:5173. One Ctrl-C stops all three.
set -eu
cd "$(dirname "$0")/../.."
. server/setup/prepare.sh

need_node
[ -n "${DATABASE_URL:-}" ] || need_mariadb
need_modules

export NODE_ENV=development
export PORT="${PORT:-3000}"
export INBOX_PORT="${INBOX_PORT:-$((PORT + 1))}"
export DB_PORT="${DB_PORT:-$((PORT + 2))}"
export APP_URL="${APP_URL:-http://localhost:5173}"
if [ -z "${SMTP_URL:-}" ]; then
  export SMTP_PORT="${SMTP_PORT:-$((PORT + 3))}"
  node --import tsx fake-services/mail/main.ts &
  mail=$!
  export SMTP_URL="smtp://127.0.0.1:$SMTP_PORT"
  export DEMO="${DEMO:-1}"
fi
node --watch --watch-preserve-output --import tsx server/main.ts &
server=$!
node node_modules/vite/bin/vite.js &
client=$!

# The server goes before the mail fake, so that its last mail is still taken.
stop_all() {
  trap '' INT TERM
  kill -TERM "$server" "$client" 2>/dev/null || true
  wait "$server" "$client" 2>/dev/null || true
  [ -z "${mail:-}" ] || kill -TERM "$mail" 2>/dev/null || true
  wait
  exit 0
}
trap stop_all INT TERM
wait
