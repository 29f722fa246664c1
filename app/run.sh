#!/bin/sh
# Opens Slabwright on a sample job, or on the job given: sh app/run.sh [JOB]
#
# Does all the set-up on a bare Debian or Ubuntu first. Without a display it writes the job's sweep and a picture
# of the window into the current folder instead.
set -eu
here=$(pwd)
root=$(cd "$(dirname "$0")/.." && pwd)
# shellcheck source=app/setup.sh
. "$root/app/setup.sh"
set_up gui
job=${1:-$root/app/samples/weather-radar-cover.slabjob}
if [ "$(uname -s)" = Linux ] && [ -z "${DISPLAY:-}${WAYLAND_DISPLAY:-}" ]; then
    name=$(basename "$job" .slabjob)
    say "There is no display here (neither DISPLAY nor WAYLAND_DISPLAY is set), so the window cannot open."
    "$python" -I -m app sweep "$job" --csv "$here/$name.csv"
    "$python" -I -m app picture "$job" --png "$here/$name.png"
    say "Instead, the sweep of the job: $here/$name.csv"
    say "and a picture of its window:   $here/$name.png"
    exit 0
fi
exec "$python" -I -m app "$job"
