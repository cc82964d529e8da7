#!/bin/sh
# The gate: sets up what the tests need and runs all of them. It stops at the
# first part that fails, with that part's name.
set -eu

here=$(CDPATH= cd -- "$(dirname -- "$0")/.." && pwd)
cd "$here"
export LANG=en_GB.UTF-8
staticcheck=honnef.co/go/tools/cmd/staticcheck@v0.7.0
part() { printf '\n== %s\n' "$*"; }
fail() {
	printf 'FAILED: %s\n' "$*" >&2
	exit 1
}

part "what the tests need"
need=""
for pair in gcc:gcc Xvfb:xvfb xdotool:xdotool pdftotext:poppler-utils; do
	command -v "${pair%%:*}" >/dev/null 2>&1 || need="$need ${pair#*:}"
done
for header in X11/Xlib.h X11/Xcursor/Xcursor.h X11/extensions/Xrandr.h X11/extensions/Xinerama.h X11/extensions/XInput2.h X11/extensions/xf86vmode.h GL/gl.h; do
	[ -e "/usr/include/$header" ] || need="$need headers"
done
if [ -n "$need" ]; then
	root=""
	[ "$(id -u)" = 0 ] || root=sudo
	if command -v apt-get >/dev/null 2>&1; then
		$root apt-get update
		$root env DEBIAN_FRONTEND=noninteractive apt-get install -y --no-install-recommends \
			gcc libc6-dev pkg-config libgl-dev libgl1-mesa-dri libx11-dev libxcursor-dev libxrandr-dev libxinerama-dev \
			libxi-dev libxxf86vm-dev ca-certificates xvfb xdotool poppler-utils
	elif command -v dnf >/dev/null 2>&1; then
		$root dnf install -y gcc pkgconf-pkg-config mesa-libGL-devel mesa-dri-drivers libX11-devel libXcursor-devel libXrandr-devel \
			libXinerama-devel libXi-devel libXxf86vm-devel xorg-x11-server-Xvfb xdotool poppler-utils
	elif command -v pacman >/dev/null 2>&1; then
		$root pacman -S --needed --noconfirm gcc pkgconf mesa libx11 libxcursor libxrandr libxinerama libxi libxxf86vm \
			xorg-server-xvfb xdotool poppler
	else
		fail "install a C compiler, the headers of X11 and OpenGL, Xvfb, xdotool and pdftotext"
	fi
fi

part "gofmt"
unformatted=$(gofmt -l acoustics resonators assets samples app)
[ -z "$unformatted" ] || fail "gofmt: $unformatted"

part "go vet"
go vet -tags gles ./... || fail "go vet"
CGO_ENABLED=0 go vet -tags headless ./app ./app/verbs || fail "go vet, headless"

part "staticcheck"
go run "$staticcheck" -tags gles ./... || fail "staticcheck"

part "build without window, C compiler and display"
CGO_ENABLED=0 go build -tags headless -o .build/stillroom-headless ./app || fail "headless build"

part "tests, with the race detector"
go test -race -tags gles -timeout 30m ./... || fail "tests"

part "the real window"
log=.build/realwindow.log
n=90
while [ -e "/tmp/.X$n-lock" ]; do n=$((n + 1)); done
Xvfb ":$n" -noreset -screen 0 1280x800x24 >/dev/null 2>&1 &
server=$!
trap 'kill $server 2>/dev/null || true' EXIT
tries=0
until [ -e "/tmp/.X11-unix/X$n" ]; do
	tries=$((tries + 1))
	[ $tries -lt 100 ] || fail "Xvfb does not start"
	sleep 0.1
done
unset WAYLAND_DISPLAY || true
if ! DISPLAY=":$n" go test -tags gles,realwindow -count=1 -v -run 'RealWindow' ./app/window/realwindow >"$log" 2>&1; then
	cat "$log"
	fail "the real window"
fi
cat "$log"
grep -q '^--- PASS: TestRealWindow' "$log" || fail "the real window: no test has run"
! grep -q 'Error in Fyne call thread' "$log" || fail "the real window: a widget was touched from the wrong goroutine"

printf '\nAll checks passed.\n'
