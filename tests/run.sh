#!/usr/bin/env bash
# Sets up what is missing, builds, and runs every test. Usage: tests/run.sh [--filter EXPRESSION]
set -euo pipefail
top=$(cd "$(dirname "${BASH_SOURCE[0]}")/.." && pwd)
# shellcheck source=tests/setup.sh
source "$top/tests/setup.sh"
need_dotnet
need_gdal
want_check_tools
build Release

log=$(mktemp)
trap 'rm -f "$log"' EXIT
status=0
say "Testing ..."
dotnet test "$top/GeoCulvert.sln" -c Release --no-build --nologo -v quiet "$@" >"$log" 2>&1 || status=$?
grep -vE '^(Test run for|VSTest version|Starting test execution|A total of|No test (is|matches)|Make sure that|Additionally, path|\s*$)' "$log" || true

# "Passed!  - Failed:     0, Passed:    15, Skipped:     0, Total: ..." once for each assembly
awk '
  /Failed: *[0-9]+, Passed: *[0-9]+, Skipped: *[0-9]+/ {
    for (i = 1; i < NF; i++) {
      if ($i == "Failed:") failed += $(i + 1)
      if ($i == "Passed:") passed += $(i + 1)
      if ($i == "Skipped:") skipped += $(i + 1)
    }
  }
  END { printf "%d passed, %d failed, %d skipped\n", passed, failed, skipped; exit passed + failed == 0 }' "$log" || status=1
exit "$status"
