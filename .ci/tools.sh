#!/usr/bin/env bash
# Sets up what the firmware images need beyond stable Rust: a compiler that has a `core` for the
# microcontroller targets, and the emulators of their chips. Quick and silent when all is there.
#
#   tools.sh [--way auto|rustup|distro] [--target TARGET]... [--no-emulator] [--disassembler] [-- COMMAND...]
#
#     rustup   the toolchain in use, its missing targets added by `rustup target add`
#     distro   Debian's compiler (rustc-web, cargo-web) with `core` built once from rust-web-src
#     auto     the compiler in use if it has the targets; else rustup; else distro
#
# With a COMMAND it is run in the environment found; without one, the shell lines that make that
# environment are printed, so that `eval "$(.ci/tools.sh)"` works. Progress goes to standard error.
#
# Exit codes: 0 all there; 2 wrong call; 3 something is missing and could not be installed (the
# message says what to install); else that of COMMAND.
set -euo pipefail

# The minor version in the rust-version of Cargo.toml.
OLDEST_RUST=$(sed -n 's/^rust-version = "1\.\([0-9]*\)".*/\1/p' "$(dirname "$0")/../Cargo.toml")
CACHE=${TOEHOLD_TOOLS:-${XDG_CACHE_HOME:-${HOME:-/tmp}/.cache}/toehold-tools}

say() { echo "tools: $*" >&2; }
wrong_call() { say "$*"; sed -n '5,5s/^# *//p' "$0" >&2; exit 2; }
missing_tool() { say "$*"; exit 3; }

# ---- what is asked ---------------------------------------------------------------------------
WAY=auto
TARGETS=()
WANT_EMULATOR=yes
WANT_DISASSEMBLER=no
while [ $# -gt 0 ]; do
  case $1 in
    --way) [ $# -gt 1 ] || wrong_call "--way needs a value: auto, rustup or distro"; WAY=$2; shift 2 ;;
    --target) [ $# -gt 1 ] || wrong_call "--target needs a value, for example thumbv7m-none-eabi"; TARGETS+=("$2"); shift 2 ;;
    --no-emulator) WANT_EMULATOR=no; shift ;;
    --disassembler) WANT_DISASSEMBLER=yes; shift ;;
    --) shift; break ;;
    *) wrong_call "unknown argument '$1'" ;;
  esac
done
case $WAY in auto | rustup | distro) ;; *) wrong_call "--way $WAY: must be auto, rustup or distro" ;; esac
[ ${#TARGETS[@]} -gt 0 ] || TARGETS=(thumbv6m-none-eabi thumbv7m-none-eabi thumbv7em-none-eabihf)

# ---- probes ----------------------------------------------------------------------------------
# A target is usable if the compiler's own directory for it holds a libcore.
has_core() { # rustc target
  local directory
  directory=$("$1" --print target-libdir --target "$2" 2>/dev/null) && compgen -G "$directory/libcore-*.rlib" >/dev/null
}

# Prints those targets that this compiler cannot build for, one a line.
targets_missing() { # rustc
  local target
  for target in "${TARGETS[@]}"; do has_core "$1" "$target" || echo "$target"; done
}

new_enough() { # rustc
  local minor
  minor=$("$1" -V 2>/dev/null | sed -n 's/^rustc 1\.\([0-9]*\)\..*/\1/p')
  [ -n "$minor" ] && [ "$minor" -ge "$OLDEST_RUST" ]
}

# ---- Debian's packages -----------------------------------------------------------------------
# Installing needs root; says how to become root, or fails.
root_by() {
  if [ "$(id -u)" = 0 ]; then echo env
  elif command -v sudo >/dev/null && sudo -n true 2>/dev/null; then echo "sudo -n env"
  else return 1; fi
}

# No recommended packages: those of the emulator can clash with newer ones already installed.
install_packages() { # package...
  local as_root
  command -v apt-get >/dev/null || { say "there is no apt-get here"; return 1; }
  as_root=$(root_by) || { say "not root, and no sudo without a password"; return 1; }
  say "installing $*"
  # Word splitting is wanted: `sudo -n env` is three words.
  # shellcheck disable=SC2086
  {
    $as_root apt-get -o DPkg::Lock::Timeout=300 -q update || say "could not refresh the package lists; trying with the old ones"
    $as_root DEBIAN_FRONTEND=noninteractive apt-get -o DPkg::Lock::Timeout=300 -q install -y --no-install-recommends "$@"
  } >&2 </dev/null
}

not_installed() { # package...
  local package
  for package in "$@"; do
    dpkg-query -W -f='${Status}' "$package" 2>/dev/null | grep -q 'ok installed' || echo "$package"
  done
}

# ---- the three ways to a compiler --------------------------------------------------------------
# Each returns 0 once the compiler builds for every target, and sets TOOLCHAIN_BIN if that compiler
# is not the one in use. They are called as conditions, where `set -e` is off: every step says for
# itself what follows if it fails.
TOOLCHAIN_BIN=

in_use_way() {
  command -v "${RUSTC:-rustc}" >/dev/null && command -v cargo >/dev/null && new_enough "${RUSTC:-rustc}" &&
    [ -z "$(targets_missing "${RUSTC:-rustc}")" ]
}

rustup_way() {
  if ! command -v rustup >/dev/null || ! command -v rustc >/dev/null; then
    say "there is no rustup here"
    return 1
  fi
  new_enough rustc || { say "$(rustc -V) is older than 1.$OLDEST_RUST"; return 1; }
  local target missing=()
  while read -r target; do missing+=("$target"); done < <(targets_missing rustc)
  if [ ${#missing[@]} -gt 0 ]; then
    say "adding by rustup: ${missing[*]}"
    timeout 300 rustup target add "${missing[@]}" >&2 </dev/null || { say "rustup could not add them"; return 1; }
  fi
  [ -z "$(targets_missing rustc)" ]
}

# Debian ships the source of `core` but no build of it for microcontrollers. It is built once, into
# a directory shaped like a rustup toolchain, so that plain `cargo build --target` works afterwards.
distro_way() {
  local packages=(rustc-web cargo-web rust-web-src lld-22) package missing=()
  command -v dpkg-query >/dev/null || { say "this is no Debian"; return 1; }
  while read -r package; do missing+=("$package"); done < <(not_installed "${packages[@]}")
  [ ${#missing[@]} = 0 ] || install_packages "${missing[@]}" || return 1
  new_enough /usr/bin/rustc || { say "Debian's $(/usr/bin/rustc -V) is older than 1.$OLDEST_RUST"; return 1; }

  # The built libraries belong to one exact compiler.
  local host compiler toolchain
  host=$(/usr/bin/rustc -vV | sed -n 's/^host: //p')
  compiler=$(/usr/bin/rustc -vV | sha256sum | cut -c1-12)
  toolchain=$CACHE/$compiler
  distro_toolchain "$toolchain" "$host" || { say "cannot write to $toolchain"; return 1; }
  local target wanted=()
  while read -r target; do wanted+=("$target"); done < <(targets_missing "$toolchain/bin/rustc")
  [ ${#wanted[@]} = 0 ] || distro_core "$toolchain" "${wanted[@]}" || return 1
  [ -z "$(targets_missing "$toolchain/bin/rustc")" ] || return 1
  TOOLCHAIN_BIN=$toolchain/bin
}

distro_toolchain() { # directory host
  local tool
  mkdir -p "$1/bin" "$1/lib/rustlib/$2/bin" "$1/lib/rustlib/src" || return 1
  for tool in rustc rustdoc; do
    # Replaced in one step: another run may be using it.
    printf '#!/bin/sh\nexec /usr/bin/%s --sysroot "%s" "$@"\n' "$tool" "$1" >"$1/bin/$tool.$$" &&
      chmod +x "$1/bin/$tool.$$" &&
      mv "$1/bin/$tool.$$" "$1/bin/$tool" || return 1
  done
  # rustc looks for its linker as rust-lld.
  ln -sfn /usr/bin/cargo "$1/bin/cargo" &&
    ln -sfn "/usr/lib/rustlib/$2/lib" "$1/lib/rustlib/$2/lib" &&
    ln -sfn /usr/bin/lld-22 "$1/lib/rustlib/$2/bin/rust-lld" &&
    ln -sfn /usr/lib/rustlib/src/rust "$1/lib/rustlib/src/rust"
}

distro_core() { # directory target...
  local toolchain=$1 seed target arguments=()
  shift
  say "building core for $* (once, about a minute)"
  seed=$(mktemp -d "$toolchain/seed.XXXXXX") && mkdir "$seed/src" || return 1
  echo '#![no_std]' >"$seed/src/lib.rs"
  cat >"$seed/Cargo.toml" <<'SEED'
[package]
name = "seed"
version = "0.0.0"
edition = "2024"
[workspace]
[profile.release]
panic = "abort"
codegen-units = 1
SEED
  for target in "$@"; do arguments+=(--target "$target"); done
  # -Cembed-bitcode: without it `lto = true` fails later. RUSTC_BOOTSTRAP: building core is not a
  # stable option. What a calling cargo or rustup left in the environment must not leak in.
  (cd "$seed" && env -u RUSTUP_TOOLCHAIN -u CARGO_ENCODED_RUSTFLAGS -u CARGO_TARGET_DIR -u CARGO_BUILD_TARGET \
    -u RUSTC_WRAPPER -u RUSTC_WORKSPACE_WRAPPER \
    PATH=/usr/bin:/bin RUSTC=/usr/bin/rustc RUSTC_BOOTSTRAP=1 RUSTFLAGS=-Cembed-bitcode=yes \
    /usr/bin/cargo build --quiet --release -Zbuild-std=core,alloc "${arguments[@]}" >&2 </dev/null) ||
    { rm -rf "$seed"; say "core did not build"; return 1; }
  for target in "$@"; do
    local place=$toolchain/lib/rustlib/$target/lib
    rm -rf "$place" "$place.part" &&
      mkdir -p "$place.part" &&
      cp "$seed/target/$target/release/deps/"lib{core,alloc,compiler_builtins}-*.rlib "$place.part/" &&
      mv "$place.part" "$place" || return 1
  done
  rm -rf "$seed"
}

what_to_install() {
  echo "No compiler of Rust 1.$OLDEST_RUST or newer for ${TARGETS[*]}. Either of these helps:"
  echo "  with rustup:            rustup update; rustup target add ${TARGETS[*]}"
  echo "  on Debian, as root:     apt-get install --no-install-recommends rustc-web cargo-web rust-web-src lld-22"
}

# ---- do it -------------------------------------------------------------------------------------
case $WAY in
  auto) in_use_way || rustup_way || distro_way || missing_tool "$(what_to_install)" ;;
  rustup) rustup_way || missing_tool "$(what_to_install)" ;;
  distro) distro_way || missing_tool "$(what_to_install)" ;;
esac

# A program and the Debian package that has it.
provide() { # program package what
  "$1" --version >/dev/null 2>&1 && return
  if ! install_packages "$2" || ! "$1" --version >/dev/null 2>&1; then
    missing_tool "$3 $1 is not here. On Debian, as root: apt-get install --no-install-recommends $2; elsewhere: your system's package that has it."
  fi
}

# Each emulator, as far as the targets need it.
provide_emulator() { # program package
  provide "$1" "$2" "The emulator"
}

if [ "$WANT_EMULATOR" = yes ]; then
  for target in "${TARGETS[@]}"; do
    case $target in
      thumb*) provide_emulator qemu-system-arm qemu-system-arm ;;
      riscv32*) provide_emulator qemu-system-riscv32 qemu-system-misc ;;
    esac
  done
fi

if [ "$WANT_DISASSEMBLER" = yes ]; then provide llvm-objdump llvm "The disassembler"; fi

if [ -n "$TOOLCHAIN_BIN" ]; then
  # First in PATH, so that cargo finds this compiler and not rustup's stand-in.
  unset RUSTUP_TOOLCHAIN RUSTC RUSTDOC CARGO
  export PATH="$TOOLCHAIN_BIN:$PATH"
  [ $# -gt 0 ] || printf 'unset RUSTUP_TOOLCHAIN RUSTC RUSTDOC CARGO\nexport PATH=%q\n' "$PATH"
fi
[ $# = 0 ] || exec "$@"
