#!/bin/sh
# Prepares a machine for whither.
#
#   sh io/setup.sh          checks what the program needs and installs what is missing, where it may
#   sh io/setup.sh build    the same, then builds the program; io/whither calls this when there is no build yet
#   sh io/setup.sh test     the same with what the tests use besides, then runs every test
#
# Needed: a JDK, version 17 or later, and Maven, 3.6.3 or later. Wanted: Mesa's software OpenGL and a font; without
# them the program gives its numbers but no pictures. On Debian and Ubuntu, packages are installed with apt-get by
# root, or through sudo; through sudo without a terminal only where it asks for no password. Animations as MP4 want
# ffmpeg besides, which is large and is installed for the tests alone: apt-get install ffmpeg.
#
# Exit status: 0 done, 1 the build or a test failed, 2 wrong usage, 3 something needed is missing.
#
# io/whither reads this file for its functions; nothing runs then (see the last lines).

jdk_least=17
maven_least=3.6.3
jvm_folder=/usr/lib/jvm
gl_packages='libegl1 libegl-mesa0 libgl1 libgl1-mesa-dri libgles2 libxrender1'
# Java2D draws text with them; the headless Java of newer systems does not bring libharfbuzz0b itself.
text_packages='libfreetype6 libharfbuzz0b fontconfig fonts-dejavu-core'
test_packages='python3-h5py hdf5-tools ffmpeg'
# A browser that prints the page of the report; of these systems only Debian has one as a package.
if grep -q '^ID=debian$' /etc/os-release 2>/dev/null; then test_packages="$test_packages chromium"; fi
# The Khronos validator of glTF files, from npm.
node_tools='gltf-validator@2.0.0-dev.3.10'
# The same where there is no dpkg to ask: sonames as the dynamic linker knows them.
gl_libraries='libEGL.so.1 libEGL_mesa.so.0 libGL.so.1 libGLESv2.so.2 libXrender.so.1'
text_libraries='libfreetype.so.6 libharfbuzz.so.0 libfontconfig.so.1'

say() {
  printf 'whither setup: %s\n' "$*" >&2
}

# ---- Java -----------------------------------------------------------------------------------------------------------

# Sets major to the version (17, 21, …) of the Java in folder $1, or to 0; $2 is the tool (java or javac) to ask when
# the folder has no release file.
java_version() {
  version=
  if [ -r "$1/release" ]; then
    while IFS='=' read -r key value; do
      if [ "$key" = JAVA_VERSION ]; then
        version=${value#\"}
        break
      fi
    done <"$1/release"
  fi
  if [ -z "$version" ]; then
    # 'javac 17.0.15', 'openjdk version "17.0.15" 2025-04-15', 'java version "1.8.0_392"'
    version=$("$1/bin/$2" -version 2>&1 |
      sed -n -e 's/^javac \([0-9].*\)$/\1/p' -e 's/^[a-z]* version "\([^"]*\)".*$/\1/p' | sed 1q)
  fi
  version=${version#1.}
  major=${version%%[!0-9]*}
  major=${major:-0}
}

# Sets java_home to a Java of version 17 or later with the tool $1 (java or javac), and major to its version: the one
# of JAVA_HOME, else of PATH, else the newest under jvm_folder. Status 1 if there is none.
find_java() {
  java_home=${JAVA_HOME:-}
  java_home=${java_home%/}
  if [ -n "$java_home" ] && [ -x "$java_home/bin/$1" ]; then
    java_version "$java_home" "$1"
    [ "$major" -lt "$jdk_least" ] || return 0
  fi
  if tool=$(command -v "$1"); then
    real=$(readlink -f "$tool" || echo "$tool")
    java_home=${real%/bin/"$1"}
    if [ ! -r "$java_home/release" ]; then
      # A wrapper, not the tool itself: ask where its Java lives.
      prefix=
      [ "$1" = java ] || prefix=-J
      java_home=$("$tool" ${prefix}-XshowSettings:properties -version 2>&1 | sed -n 's/^ *java\.home = //p' | sed 1q)
    fi
    if [ -x "$java_home/bin/$1" ]; then
      java_version "$java_home" "$1"
      [ "$major" -lt "$jdk_least" ] || return 0
    fi
  fi
  newest_home=''
  newest=0
  for java_home in "$jvm_folder"/*; do
    if [ -x "$java_home/bin/$1" ]; then
      java_version "$java_home" "$1"
      if [ "$major" -ge "$jdk_least" ] && [ "$major" -gt "$newest" ]; then
        newest_home=$java_home newest=$major
      fi
    fi
  done
  java_home=$newest_home major=$newest
  [ -n "$java_home" ]
}

# A bare machine sets no locale, and Java then writes '?' for µ and θ and cannot open a file named with them.
use_utf8() {
  case ${LC_ALL:-${LC_CTYPE:-${LANG:-}}} in
    '' | C | POSIX)
      unset LC_ALL
      LC_CTYPE=C.UTF-8
      export LC_CTYPE
      ;;
  esac
}

# ---- the state of the build -----------------------------------------------------------------------------------------

# Sets the paths of the build, from the folder $1 that holds this file.
locate() {
  root=${1%/*}
  target=$1/target
  jar=$target/whither.jar
  half_built=$target/half-built # there while a build is under way, and after one that did not end well
  archives=$target/classes-of-java # and the version: the program's classes as the JVM wants them in memory
}

# Whether a whole program is there and, in a git clone, no source of it is newer.
is_built() {
  [ -f "$jar" ] && [ -d "$target/lib" ] && [ ! -e "$half_built" ] || return 1
  [ -e "$root/.git" ] && [ -w "$target" ] || return 0
  [ -z "$(find "$root/pom.xml" "$root"/*/pom.xml "$root"/*/src/main -type f ! -name '.*' ! -name '*~' \
    -newer "$jar" -print 2>/dev/null)" ]
}

# ---- what the machine has -------------------------------------------------------------------------------------------

# Whether version $1 is $2 or later; numbers parted by dots, what follows them is left out of account.
at_least() {
  have=$1. want=$2.
  while [ -n "$want" ]; do
    have_part=${have%%.*} want_part=${want%%.*}
    have_part=${have_part%%[!0-9]*}
    have_part=${have_part:-0}
    [ "$have_part" -le "$want_part" ] || return 0
    [ "$have_part" -ge "$want_part" ] || return 1
    have=${have#*.} want=${want#*.}
  done
}

has_dpkg() {
  command -v dpkg-query >/dev/null
}

# Prints those of the packages in the arguments that are not installed.
absent_packages() {
  installed=" $(dpkg-query -W -f='${db:Status-Status}=${Package} ' "$@" 2>/dev/null) " || true
  for package in "$@"; do
    case $installed in
      *" installed=$package "*) ;;
      *) printf ' %s' "$package" ;;
    esac
  done
}

# Prints those of the shared libraries in the arguments that the dynamic linker does not know.
absent_libraries() {
  known=$(PATH=$PATH:/sbin:/usr/sbin ldconfig -p 2>/dev/null) || true
  for library in "$@"; do
    case $known in
      *"$library "*) ;;
      *) printf ' %s' "$library" ;;
    esac
  done
}

# Sets maven to the command and maven_version to its version, without starting a JVM where the version can be read.
find_maven() {
  maven_version=
  if ! maven=$(command -v mvn); then
    maven=${MAVEN_HOME:-/nowhere}/bin/mvn
    [ -x "$maven" ] || return 1
  fi
  real=$(readlink -f "$maven" || echo "$maven")
  for core in "${real%/bin/mvn}"/lib/maven-core-[0-9]*.jar; do
    maven_version=${core##*/maven-core-}
    maven_version=${maven_version%.jar}
  done
  case $maven_version in
    3.x) # Debian's own layout
      maven_version=$(dpkg-query -W -f='${Version}' maven 2>/dev/null) || maven_version=
      maven_version=${maven_version%-*}
      ;;
    *'*'*) maven_version= ;;
  esac
  if [ -z "$maven_version" ]; then
    maven_version=$("$maven" -B -v 2>/dev/null | sed -n 's/^.*Apache Maven \([0-9][0-9.]*\).*$/\1/p' | sed 1q)
  fi
  at_least "${maven_version:-0}" "$maven_least"
}

# Sets jdk_missing and maven_missing to yes or nothing, and gl_missing, text_missing, test_missing to names.
look() {
  jdk_missing='' maven_missing='' gl_missing='' text_missing='' test_missing=''
  find_java javac || jdk_missing=yes
  find_maven || maven_missing=yes
  [ "$(uname -s)" = Linux ] || return 0
  # The lists are split into words on purpose.
  # shellcheck disable=SC2086
  if has_dpkg; then
    absent=$(absent_packages $gl_packages $text_packages $test_packages)
    gl_missing=$(only "$absent" $gl_packages)
    text_missing=$(only "$absent" $text_packages)
    [ "$task" != test ] || test_missing=$(only "$absent" $test_packages)
  else
    gl_missing=$(absent_libraries $gl_libraries)
    text_missing=$(absent_libraries $text_libraries)
    if [ "$task" = test ]; then
      command -v h5dump >/dev/null || test_missing="$test_missing h5dump"
      python3 -c 'import h5py' >/dev/null 2>&1 || test_missing="$test_missing h5py"
      command -v ffmpeg >/dev/null || test_missing="$test_missing ffmpeg"
    fi
  fi
}

# Prints the words of the list $1 that are among the other arguments.
only() {
  list="$1 "
  shift
  for word in "$@"; do
    case $list in *" $word "*) printf ' %s' "$word" ;; esac
  done
}

# ---- installing -----------------------------------------------------------------------------------------------------

# Sets as_root to what must stand before a command to run it as root; status 1 if this account may not.
may_install() {
  as_root=
  has_dpkg && command -v apt-get >/dev/null || return 1
  [ "$(id -u)" -ne 0 ] || return 0
  command -v sudo >/dev/null || return 1
  if sudo -n true 2>/dev/null; then
    as_root='sudo -n'
  elif [ -t 0 ] && [ -t 2 ]; then
    as_root=sudo
  else
    return 1
  fi
}

apt() {
  # as_root is a command with its option, or nothing.
  # shellcheck disable=SC2086
  $as_root env DEBIAN_FRONTEND=noninteractive apt-get -o DPkg::Lock::Timeout=300 "$@" >>"$log" 2>&1 </dev/null
}

# Fetches the package lists, once in a run; a machine just started may hold the lock for its own update.
apt_update() {
  [ -z "$updated" ] || return 1
  updated=yes
  tries=0
  until apt update; do
    tries=$((tries + 1))
    if [ "$tries" -ge 60 ] || ! tail -n 5 "$log" | grep -q 'Could not get lock'; then break; fi
    sleep 2
  done
}

# Installs the packages in the arguments; fetches the lists only if it does not work with those that are there.
apt_install() {
  apt install -y --no-install-recommends "$@" && return 0
  apt_update && apt install -y --no-install-recommends "$@"
}

knows() {
  apt-cache show "$1" 2>/dev/null | grep -q '^Package:'
}

# Sets jdk_package to the name this system gives to a JDK without a graphical environment.
name_jdk() {
  jdk_package=openjdk-17-jdk-headless
  if ! knows $jdk_package; then
    if knows default-jdk-headless; then
      jdk_package=default-jdk-headless
    else
      # No package lists yet. Debian 13 and later have no version 17 of their own.
      case $(sed -n -e 's/^ID=//p' -e 's/^VERSION_ID=//p' /etc/os-release 2>/dev/null | tr -d '"\n') in
        debian1[0-2] | 1[0-2]debian | *ubuntu*) ;;
        *) jdk_package=default-jdk-headless ;;
      esac
    fi
  fi
}

# Sets needed and wanted to the packages that would mend what look() found missing.
name_packages() {
  needed='' wanted="$gl_missing$text_missing$test_missing"
  if [ -n "$jdk_missing" ]; then
    name_jdk
    needed=" $jdk_package"
  fi
  [ -z "$maven_missing" ] || needed="$needed maven"
}

install_missing() {
  log=$(mktemp "${TMPDIR:-/tmp}/whither-setup.XXXXXX")
  trap 'rm -f "$log"' EXIT
  updated=
  if [ -n "$jdk_missing" ] && ! knows openjdk-17-jdk-headless; then apt_update || true; fi
  name_packages
  say "installing with apt-get:$needed$wanted"
  [ "$as_root" != sudo ] || say 'sudo may ask for your password'
  # The lists are split into words on purpose. What is needed is tried alone if all together does not work.
  # shellcheck disable=SC2086
  if ! apt_install $needed $wanted; then
    say 'apt-get could not install all of it:'
    tail -n 15 "$log" >&2
    if [ -n "$needed" ] && [ -n "$wanted" ]; then apt_install $needed || true; fi
  fi
}

# Says the one command that would mend it.
say_command() {
  name_packages
  if has_dpkg && command -v apt-get >/dev/null; then
    mend="apt-get update && apt-get install -y --no-install-recommends$needed$wanted"
    if [ "$(id -u)" -eq 0 ]; then
      printf '  %s\n' "$mend" >&2
    elif command -v sudo >/dev/null; then
      printf "  sudo sh -c '%s'\n" "$mend" >&2
    else
      printf "  su -c '%s'\n" "$mend" >&2
    fi
  else
    say "the command of this system's own package manager; on Debian and Ubuntu the packages are" \
      "openjdk-17-jdk-headless maven $gl_packages $text_packages${test_missing:+ $test_packages}"
  fi
}

prepare() {
  look
  if [ -n "$jdk_missing$maven_missing$gl_missing$text_missing$test_missing" ] && may_install; then
    install_missing
    look
  fi
  if [ -n "$jdk_missing$maven_missing" ]; then
    what=
    [ -z "$jdk_missing" ] || what="a JDK (javac), version $jdk_least or later"
    if [ -n "$maven_missing" ]; then
      what="${what:+$what, and }Maven, version $maven_least or later"
      [ -z "$maven_version" ] || what="$what ($maven is $maven_version)"
    fi
    say "missing: $what. It could not be installed from here; type"
    say_command
    say 'and then the same line again.'
    exit 3
  fi
  if [ -n "$gl_missing$text_missing" ]; then
    say "there will be numbers but no pictures, as these are not installed:$gl_missing$text_missing. To mend it, type"
    say_command
  elif [ -n "$test_missing" ]; then
    say "tests against the HDF5 C library or of video cannot run, as these are not installed:$test_missing. To mend it, type"
    say_command
  fi
  if [ -n "${JAVA_HOME:-}" ] && [ "${JAVA_HOME%/}" != "$java_home" ]; then
    say "JAVA_HOME is $JAVA_HOME, which has no JDK of version $jdk_least or later; using $java_home"
  fi
  JAVA_HOME=$java_home
  export JAVA_HOME
}

# ---- building and testing -------------------------------------------------------------------------------------------

# Waits until no other build of this clone is under way. The lock is let go when this script and its Maven have ended.
take_turn() {
  mkdir -p "$target"
  command -v flock >/dev/null || return 0
  exec 9>>"$target/build.lock"
  flock -n 9 && return 0
  say 'another build is under way; waiting for it to end'
  flock 9
}

# Runs Maven on the whole house with the arguments given.
run_maven() {
  : >"$half_built"
  WHITHER_BUILD_UNDER_WAY=yes
  export WHITHER_BUILD_UNDER_WAY
  # -B and the options after it keep colours and the progress of downloads out of the output.
  (cd "$root" && exec "$maven" -B -ntp -Dstyle.color=never "$@" </dev/null) || return 1
  touch -c "$jar" # Maven leaves the file alone if only another module changed; is_built() compares with its time
  rm -f "$half_built"
}

build() {
  if [ -n "${WHITHER_BUILD_UNDER_WAY:-}" ]; then
    say 'the program cannot be started from its own build or tests, where it is not whole yet'
    exit 1
  fi
  if [ ! -w "$root/io" ]; then
    say "the program is not built yet, and this account may not write to $root/io; build it with an account that may"
    exit 3
  fi
  take_turn
  ! is_built || return 0 # another start built it meanwhile
  say 'building the program; the first time, when libraries are fetched, this takes a minute or more'
  if ! run_maven -q -Dmaven.test.skip=true package >"$target/build.log" 2>&1; then
    cat "$target/build.log" >&2
    say "the build failed; what Maven said stands above and in $target/build.log"
    exit 1
  fi
  archive_classes
}

# Lets the Java that was found write its classes and the program's as it wants them in memory, which makes every start
# quicker. Where it cannot, the program starts without.
archive_classes() {
  find_java java || return 0
  archive=$archives-$major.jsa
  rm -f "$archives"-*
  if list_classes help --help &&
    list_classes split split "$root/samples/fields/spiral-24x32.h5" --json --quiet --width 0.5 &&
    awk '!seen[$0]++' "$archive.help" "$archive.split" >"$archive.list" &&
    "$java_home/bin/java" -Xlog:disable -Xshare:dump "-XX:SharedClassListFile=$archive.list" \
      "-XX:SharedArchiveFile=$archive.new" -cp "$jar" >/dev/null 2>&1; then
    mv "$archive.new" "$archive"
  fi
  rm -f "$archive".*
}

# Runs the program with the arguments after the first and lists the classes that it uses in a file named by the first.
list_classes() {
  list=$archive.$1
  shift
  "$java_home/bin/java" --enable-native-access=ALL-UNNAMED -Xlog:disable "-XX:DumpLoadedClassList=$list" \
    -jar "$jar" "$@" >/dev/null 2>&1 && [ -f "$list" ]
}

# Puts what only tests use from npm beside the build; without it those tests report themselves skipped.
add_node_tools() {
  [ ! -d "$target/node/node_modules/gltf-validator" ] || return 0
  command -v npm >/dev/null || return 0
  npm install --silent --no-save --prefix "$target/node" "$node_tools" >/dev/null 2>&1 </dev/null || true
}

run_tests() {
  take_turn
  add_node_tools
  run_maven verify || exit 1
}

main() {
  set -eu
  here=$(CDPATH='' cd -- "$(dirname -- "$0")" && pwd -P)
  locate "$here"
  task=${1:-prepare}
  if [ $# -gt 1 ]; then task=wrong; fi
  use_utf8
  case $task in
    prepare)
      prepare
      say "ready: JDK $major, Maven $maven_version${gl_missing:+, no software OpenGL}${text_missing:+, no text in pictures}"
      ;;
    build)
      prepare
      build
      ;;
    test)
      prepare
      run_tests
      ;;
    *)
      say "what should be done is unclear: type 'sh io/setup.sh', 'sh io/setup.sh build' or 'sh io/setup.sh test'"
      exit 2
      ;;
  esac
}

case ${0##*/} in
  setup.sh) main "$@" ;;
esac
