#!/bin/sh
# npm start: everything from a fresh clone to the running server. See prepare.sh for the steps.
set -eu
cd "$(dirname "$0")/../.."
. server/setup/prepare.sh

need_node
[ -n "${DATABASE_URL:-}" ] || need_mariadb
need_modules
need_build || stop 'The build failed; see above.'
export NODE_ENV=production
# Pictures are decoded in several threads; without this each keeps memory of its own for good.
export MALLOC_ARENA_MAX=2
# exec: signals must reach the server itself, not a shell in front of it.
exec node --enable-source-maps dist-server/main.js
