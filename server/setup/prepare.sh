# Read by start.sh, test.sh and dev.sh: brings a fresh Debian with only Node to the point where they can work.
# Plain POSIX shell, because it runs before node_modules exists.

say() { printf '%s\n' "$@" >&2; }
stop() { say "$@"; exit 1; }

need_node() {
  command -v node >/dev/null 2>&1 || stop 'Node.js is missing. Install version 20.19 or newer, with npm.'
  node -e 'const [a, b] = process.versions.node.split("."); process.exit(+a > 20 || (+a === 20 && +b >= 19) ? 0 : 1)' ||
    stop "Node.js $(node -v) is too old. Install version 20.19 or newer."
}

# has PROGRAM: also looks where the PATH of ordinary users does not.
has() {
  command -v "$1" >/dev/null 2>&1 || [ -x "/usr/sbin/$1" ] || [ -x "/usr/bin/$1" ]
}

# need_packages PACKAGE...: installs Debian packages, or says which command does it.
need_packages() {
  line="apt-get install -y --no-install-recommends $*"
  if [ "$(id -u)" -ne 0 ]; then
    stop "Missing on this machine: $*" "Install with:  sudo apt-get update && sudo $line"
  fi
  command -v apt-get >/dev/null 2>&1 ||
    stop "Missing on this machine: $* (names of Debian packages). Install them with this system's package manager."
  say "Installing $* ..."
  log=$(mktemp)
  export DEBIAN_FRONTEND=noninteractive
  # The first try fails when the package lists were never fetched, or are out of date.
  # shellcheck disable=SC2086
  if ! $line >"$log" 2>&1; then
    if ! apt-get update >"$log" 2>&1 || ! $line >>"$log" 2>&1; then
      grep -E '^[EW]: ' "$log" | head -n 5 >&2
      rm -f "$log"
      stop "Could not install: $*" "When the network is there, run:  apt-get update && $line"
    fi
  fi
  rm -f "$log"
}

# my_print_defaults comes with the client package, and mariadb-install-db cannot do without it.
need_mariadb() {
  if ! has mariadbd || ! has mariadb-install-db || ! has my_print_defaults; then
    need_packages mariadb-server-core mariadb-client-core
  fi
}

need_test_programs() {
  missing=
  has chromium || missing="$missing chromium"
  has pdftotext || missing="$missing poppler-utils"
  # shellcheck disable=SC2086
  [ -z "$missing" ] || need_packages $missing
}

need_modules() {
  lock=$(cksum <package-lock.json)
  stamp=node_modules/.lock-sum
  if [ ! -d node_modules ] || [ "$(cat "$stamp" 2>/dev/null)" != "$lock" ]; then
    say 'Installing packages ...'
    # Everything, whatever NODE_ENV says: the build and the mail fake need what npm calls development packages.
    npm ci --include=dev --loglevel=error >&2 || stop 'npm ci failed; see above.'
    printf '%s\n' "$lock" >"$stamp"
  fi
}

# One sum over the names and contents of all that goes into the build.
source_sum() {
  find src server shared fake-services index.html vite.config.ts tsconfig.json package-lock.json -type f -print0 |
    LC_ALL=C sort -z | xargs -0 cksum | cksum
}

need_build() {
  sum=$(source_sum)
  if [ ! -f dist/index.html ] || [ "$(cat dist-server/.source-sum 2>/dev/null)" != "$sum" ]; then
    say 'Building ...'
    node node_modules/vite/bin/vite.js build --logLevel warn >&2 && node server/setup/buildServer.mjs >&2 || return 1
    printf '%s\n' "$sum" >dist-server/.source-sum
  fi
}
