#!/bin/sh
# Installs what is missing from Debian, builds the program and judges an example mirror.
set -eu
cd "$(dirname "$0")/.."
. examples/packages.sh
install_missing $build_packages
echo "== building (a few minutes the first time)"
cmake --preset release -DSTILLCOAT_TESTS=OFF
cmake --build --preset release
echo "== build/release/stillcoat appraise examples/end-mirror/design.toml"
build/release/stillcoat appraise examples/end-mirror/design.toml
echo "== done: the program is build/release/stillcoat; more examples stand in examples/"
