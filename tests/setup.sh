#!/usr/bin/env bash
# Installs what is missing on a fresh Debian or Ubuntu with a .NET SDK. Sourced by tests/run.sh and sample-data/run.sh.
# Quiet about its plumbing; says what it installs; does nothing the second time.

export DOTNET_CLI_TELEMETRY_OPTOUT=1 DOTNET_NOLOGO=1

say() { printf '%s\n' "$*"; }

# install PACKAGE... : through the system's package manager, as root or with sudo.
install() {
  local as_root=()
  if [ "$(id -u)" -ne 0 ]; then
    command -v sudo >/dev/null || { say "Cannot install $*: neither root nor sudo."; return 1; }
    as_root=(sudo)
  fi
  command -v apt-get >/dev/null || { say "Cannot install $*: no apt-get here."; return 1; }
  say "Installing $* (system package manager) ..."
  local log
  log=$(mktemp)
  if ! { "${as_root[@]}" apt-get update -qq && DEBIAN_FRONTEND=noninteractive "${as_root[@]}" env DEBIAN_FRONTEND=noninteractive \
      apt-get install -y -qq --no-install-recommends "$@"; } >"$log" 2>&1; then
    say "The package manager failed:"; tail -n 15 "$log"; rm -f "$log"; return 1
  fi
  rm -f "$log"
}

need_dotnet() {
  command -v dotnet >/dev/null && dotnet --list-sdks | grep '^10\.' >/dev/null && return 0
  say "A .NET 10 SDK is needed and was not found on PATH. Install it from your distribution or from Microsoft's package feed, then run this again."
  return 1
}

need_gdal() {
  ldconfig -p 2>/dev/null | grep 'libgdal\.so\.' >/dev/null && return 0 # not grep -q: with pipefail a closed pipe would look like a miss
  [ -n "${GEOCULVERT_GDAL:-}" ] && return 0
  if apt-cache show libgdal32 >/dev/null 2>&1 || { [ "$(id -u)" -eq 0 ] && apt-get update -qq >/dev/null 2>&1 && apt-cache show libgdal32 >/dev/null 2>&1; }; then
    install libgdal32
  else
    # Other releases name the library after its own ABI; the command-line package depends on the right one.
    install gdal-bin
  fi
}

# Independent tools that some tests compare with; without them those tests are skipped with a word.
want_check_tools() {
  [ -x /usr/bin/python3 ] && /usr/bin/python3 -c 'import osgeo.gdal' >/dev/null 2>&1 && command -v ogrinfo >/dev/null && return 0
  install gdal-bin python3-gdal || say "Going on without gdal-bin and python3-gdal; the tests that compare with them are skipped."
}

# build CONFIGURATION : restore and build the whole solution, showing only what went wrong.
build() {
  local log
  log=$(mktemp)
  say "Building GeoCulvert ..."
  if ! dotnet build "$top/GeoCulvert.sln" -c "$1" -v quiet -nologo >"$log" 2>&1; then
    say "The build failed:"; grep -E 'error|warn' "$log" | sort -u | head -n 40; [ -s "$log" ] && tail -n 5 "$log"; rm -f "$log"; return 1
  fi
  rm -f "$log"
}
