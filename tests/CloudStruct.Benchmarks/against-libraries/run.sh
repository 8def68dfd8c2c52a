#!/bin/sh
# Installs the libraries (Debian), builds, and times them and our kernels on one file in turn. Prints the table.
#   tests/CloudStruct.Benchmarks/against-libraries/run.sh [MILLIONS OF POINTS] [ROUNDS] [FOLDER]
set -eu
here=$(cd "$(dirname "$0")" && pwd)
millions=${1:-1}
rounds=${2:-3}
folder=${3:-$(mktemp -d)}
if [ "$(id -u)" = 0 ]; then
    apt-get update -qq
    DEBIAN_FRONTEND=noninteractive apt-get install -y -qq --no-install-recommends \
        cmake g++ pkg-config libcgal-dev libpcl-dev libopen3d-dev libnanoflann-dev libtbb-dev >/dev/null
fi
cmake -S "$here" -B "$folder/build" >/dev/null
cmake --build "$folder/build" --parallel 1 >/dev/null
dotnet build "$here/.." -c Release -v q -nologo >/dev/null
ours="dotnet $here/../bin/Release/net10.0/CloudStruct.Benchmarks.dll"
mkdir -p "$folder/out"
rm -f "$folder/out/lines.jsonl"
$ours blocky "$folder/blocky.ply" "$millions"
round=1
while [ "$round" -le "$rounds" ]; do
    $ours ours "$folder/blocky.ply" "$folder/out" >>"$folder/out/lines.jsonl"
    for library in nanoflann open3d pcl cgal; do
        "$folder/build/with_$library" "$folder/blocky.ply" "$folder/out" >>"$folder/out/lines.jsonl"
    done
    round=$((round + 1))
done
$ours compare "$folder/blocky.ply" "$folder/out"
