#!/usr/bin/env bash
# Draws the pictures of the README from the demonstration joint:
#
#   docs/pictures/make.sh           into docs/pictures
#   docs/pictures/make.sh FOLDER    elsewhere; `.ci/run pictures` compares the two
set -euo pipefail
cd "$(dirname "${BASH_SOURCE[0]}")/../.."

folder=${1:-docs/pictures}
mkdir -p "$folder"
cargo build --release --locked --quiet
weldpole=target/release/weldpole
"$weldpole" check --demo --figure "$folder/davit.svg" -o /dev/null
# A sweep ends with status 1 where a point is exceeded: that is what it is made for.
"$weldpole" sweep --demo --vary load.eccentricity=0:600:31 --figure "$folder/eccentricity.svg" -o /dev/null || [[ $? == 1 ]]
"$weldpole" sweep --demo --vary load.eccentricity=0:500:26 --vary load.angle=-90:90:19 --figure "$folder/map.svg" \
    -o /dev/null || [[ $? == 1 ]]
