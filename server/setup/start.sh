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
# A page makes little garbage: room for 16 MB of it, three times over, would only be memory held.
# exec: signals must reach the server itself, not a shell in front of it.
exec node --max-semi-space-size=8 --enable-source-maps dist-server/main.js
