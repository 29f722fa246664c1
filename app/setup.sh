# Prepares the environment of a checkout; read by app/run.sh and tests/run.sh, never run by itself.
#
#   set_up EXTRAS [GROUP]     afterwards $python is the interpreter of the checkout's own environment
#
# Idempotent, and quick when nothing changed: what was installed is remembered by its fingerprint. Python runs
# isolated (-I) throughout, so that neither PYTHONPATH nor a module in the current folder gets in its way.

say() { printf '%s\n' "$*" >&2; }

as_root() {
    if [ "$(id -u)" = 0 ]; then "$@"; else sudo -n "$@"; fi
}

may_install() {
    command -v apt-get >/dev/null 2>&1 && { [ "$(id -u)" = 0 ] || sudo -n true 2>/dev/null; }
}

# apt_packages NAME...: installs Debian or Ubuntu packages where that is permitted, else names them.
apt_packages() {
    if may_install; then
        say "Installing system packages: $*"
        as_root apt-get update -q >&2 &&
            as_root env DEBIAN_FRONTEND=noninteractive apt-get install -y -q --no-install-recommends "$@" >&2
    else
        say "These system packages are missing and cannot be installed from here: $*"
        say "On Debian or Ubuntu: sudo apt-get install $*"
        return 1
    fi
}

good_python() {
    "$1" -I -c 'import sys; raise SystemExit(sys.version_info < (3, 11))' 2>/dev/null &&
        "$1" -I -c 'import ensurepip, venv' 2>/dev/null
}

find_python() {
    for candidate in "$root/.venv/bin/python" python3 python3.13 python3.12 python3.11 python3.14; do
        if command -v "$candidate" >/dev/null 2>&1 && good_python "$candidate"; then
            printf '%s\n' "$candidate"
            return 0
        fi
    done
    return 1
}

# The shared libraries the window needs, each with the package that brings it.
qt_libraries='libGL.so.1 libgl1
libEGL.so.1 libegl1
libglib-2.0.so.0 libglib2.0-0
libxkbcommon.so.0 libxkbcommon0
libfontconfig.so.1 libfontconfig1
libdbus-1.so.3 libdbus-1-3
libxcb-cursor.so.0 libxcb-cursor0
libxcb-icccm.so.4 libxcb-icccm4
libxcb-keysyms.so.1 libxcb-keysyms1
libxcb-shape.so.0 libxcb-shape0
libxcb-xkb.so.1 libxcb-xkb1
libxkbcommon-x11.so.0 libxkbcommon-x11-0'

missing_qt_packages() {
    ldconfig=$(command -v ldconfig || printf '/sbin/ldconfig')
    [ -x "$ldconfig" ] || return 0
    known=$("$ldconfig" -p 2>/dev/null)
    printf '%s\n' "$qt_libraries" | while read -r library package; do
        case "$known" in *"$library "*) ;; *) printf '%s ' "$package" ;; esac
    done
}

fingerprint() {
    { cat "$root/pyproject.toml" "$root/.constraints.txt"; "$1" -V; printf '%s\n' "$root"; } | cksum
}

# installed PATTERN: whether a set-up that fits was remembered.
installed() { grep -qx "$1" "$venv/.slabwright" 2>/dev/null; }

set_up() {
    extras=$1
    group=${2:-}
    venv=$root/.venv
    python=$venv/bin/python
    if [ "$(uname -s)" = Linux ]; then
        lacking=$(missing_qt_packages)
        # shellcheck disable=SC2086  # a list of package names
        [ -z "$lacking" ] || apt_packages $lacking || say "Going on without them; the window may not open."
    fi
    if ! base=$(find_python); then
        apt_packages python3 python3-venv
        base=$(find_python) || { say "Python 3.11 or newer with venv is needed."; exit 1; }
    fi
    # What holds the test packages as well is enough for the window alone.
    wanted="$(fingerprint "$base") $extras"
    if [ -x "$python" ] && installed "$wanted ${group:-.*}"; then
        return 0
    fi
    say "Setting up the environment in .venv (once, and again when its list changes)"
    good_python "$python" || { rm -rf "$venv"; "$base" -I -m venv "$venv"; }
    "$python" -I -m pip install -q --disable-pip-version-check --upgrade 'pip>=25.1' >&2
    set -- -c "$root/.constraints.txt" -e "$root[$extras]"
    [ -z "$group" ] || set -- "$@" --group "$root/pyproject.toml:$group"
    "$python" -I -m pip install -q --disable-pip-version-check "$@" >&2
    printf '%s\n' "$wanted $group" >"$venv/.slabwright"
}
