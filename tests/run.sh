#!/bin/sh
# Lint, types, import contracts and the whole suite, offscreen: sh tests/run.sh [pytest arguments]
set -eu
root=$(cd "$(dirname "$0")/.." && pwd)
# shellcheck source=app/setup.sh
. "$root/app/setup.sh"
set_up gui test
cd "$root"
export QT_QPA_PLATFORM=offscreen
unset PYTHONPATH PYTHONSTARTUP DISPLAY WAYLAND_DISPLAY || true
bin=$root/.venv/bin
say "Lint"
"$bin/ruff" check .
"$bin/ruff" format --check .
say "Types"
"$bin/mypy"
say "Import contracts"
"$bin/lint-imports"
say "Tests"
exec "$python" -m pytest -m 'not slow' "$@"
