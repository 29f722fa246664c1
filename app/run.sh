#!/bin/sh
# Opens Slabwright on a sample job, or on the job given: sh app/run.sh [JOB]
#
# Does all the set-up on a bare Debian or Ubuntu first. Without a display it writes the job's sweep and a picture
# of the window into the current folder instead. Options such as --help go to the program.
set -eu
here=$(pwd)
root=$(cd "$(dirname "$0")/.." && pwd)
# shellcheck source=app/setup.sh
. "$root/app/setup.sh"
set_up gui
case ${1:-} in
    -*) exec "$python" -I -m app "$@" ;;
    '') set -- "$root/app/samples/weather-radar-cover.slabjob" ;;
esac
if ! fault=$("$python" -I -m app.window.display); then
    name=$(basename "$1" .slabjob)
    say "There is no display here ($fault), so the window cannot open."
    "$python" -I -m app sweep "$1" --csv "$here/$name.csv"
    "$python" -I -m app picture "$1" --png "$here/$name.png"
    say "Instead, the sweep of the job: $here/$name.csv"
    say "and a picture of its window:   $here/$name.png"
    exit 0
fi
exec "$python" -I -m app "$@"
