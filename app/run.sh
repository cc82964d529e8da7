#!/bin/sh
# Starts Stillroom: checks for what a build needs, installs what is missing,
# builds when something has changed, and passes its arguments on.
#   STILLROOM_BUILD=release sh app/run.sh   builds for the desktop's OpenGL, faster
#                                           at run time, slower to build the first time
set -eu

here=$(CDPATH= cd -- "$(dirname -- "$0")/.." && pwd)
out="$here/.build"
say() { printf '%s\n' "stillroom: $*" >&2; }

command -v go >/dev/null 2>&1 || {
	say "Go is not installed. Install Go 1.26 or later (https://go.dev/dl) and start again."
	exit 1
}

is_verb() {
	case "${1-}" in
	modes | level | absorbers | check | tune | sheets | figure | sample | help | --help | -h | --version) return 0 ;;
	esac
	return 1
}

build_headless() {
	mkdir -p "$out"
	(cd "$here" && CGO_ENABLED=0 go build -tags headless -o "$out/stillroom-headless" ./app)
}

# A verb needs no window, no C compiler and no display.
if is_verb "${1-}"; then
	build_headless
	exec "$out/stillroom-headless" "$@"
fi

system=$(uname -s)
if [ "$system" = Linux ] && [ -z "${DISPLAY-}" ] && [ -z "${WAYLAND_DISPLAY-}" ]; then
	say "there is no display: printing the mode table and writing the sheets instead of opening the window"
	build_headless
	file=${1-}
	if [ -z "$file" ]; then
		file=edit-suite.stillroom
		[ -e "$file" ] || "$out/stillroom-headless" sample edit-suite >/dev/null
	fi
	"$out/stillroom-headless" modes "$file"
	pdf=$(basename -- "$file" .stillroom).pdf
	"$out/stillroom-headless" sheets "$file" --out "$pdf"
	say "the sheets are in $pdf"
	exit 0
fi

root() {
	if [ "$(id -u)" = 0 ]; then "$@"; elif command -v sudo >/dev/null 2>&1; then sudo "$@"; else
		say "please run as root: $*"
		exit 1
	fi
}

# have_headers compiles and links against what the window needs.
have_headers() {
	command -v gcc >/dev/null 2>&1 || return 1
	printf '%s\n' '#include <X11/Xlib.h>' '#include <X11/Xcursor/Xcursor.h>' '#include <X11/extensions/Xrandr.h>' \
		'#include <X11/extensions/Xinerama.h>' '#include <X11/extensions/XInput2.h>' '#include <X11/extensions/xf86vmode.h>' \
		'#include <GL/gl.h>' 'int main(void) { return 0; }' |
		gcc -x c - -o /dev/null -lX11 -lXrandr -lXxf86vm -lXi -lXcursor -lXinerama -lGL >/dev/null 2>&1
}

case "$system" in
Linux)
	if ! have_headers; then
		if command -v apt-get >/dev/null 2>&1; then
			set_of="gcc libc6-dev pkg-config libgl-dev libgl1-mesa-dri libx11-dev libxcursor-dev libxrandr-dev libxinerama-dev libxi-dev libxxf86vm-dev ca-certificates"
			say "installing: $set_of"
			root apt-get update
			root env DEBIAN_FRONTEND=noninteractive apt-get install -y --no-install-recommends $set_of
		elif command -v dnf >/dev/null 2>&1; then
			set_of="gcc pkgconf-pkg-config mesa-libGL-devel mesa-dri-drivers libX11-devel libXcursor-devel libXrandr-devel libXinerama-devel libXi-devel libXxf86vm-devel"
			say "installing: $set_of"
			root dnf install -y $set_of
		elif command -v pacman >/dev/null 2>&1; then
			set_of="gcc pkgconf mesa libx11 libxcursor libxrandr libxinerama libxi libxxf86vm"
			say "installing: $set_of"
			root pacman -S --needed --noconfirm $set_of
		else
			say "a C compiler and the headers of X11 and OpenGL are missing; install them with this system's package manager"
			exit 1
		fi
		have_headers || {
			say "a C compiler and the headers of X11 and OpenGL are still missing"
			exit 1
		}
	fi
	;;
Darwin)
	command -v cc >/dev/null 2>&1 || {
		say "the C compiler is missing; install it with: xcode-select --install"
		exit 1
	}
	;;
*)
	command -v gcc >/dev/null 2>&1 || {
		say "a C compiler is missing; install MinGW-w64 (gcc) and put it on the PATH"
		exit 1
	}
	;;
esac

mkdir -p "$out"
if [ "${STILLROOM_BUILD-quick}" = release ]; then
	set -- release "$@"
	(cd "$here" && go build -tags migrated_fynedo,no_emoji -ldflags '-s -w' -o "$out/stillroom" ./app)
elif [ "$system" = Linux ]; then
	set -- quick "$@"
	[ -e "$out/stillroom" ] || say "building for the first time takes a minute or two"
	(cd "$here" && go build -tags gles -o "$out/stillroom" ./app)
else
	set -- quick "$@"
	(cd "$here" && go build -o "$out/stillroom" ./app)
fi
shift
exec "$out/stillroom" "$@"
