#!/usr/bin/env bash
# Compares the service with another program on the same stream: frames a second, and processor time a frame of the
# whole process. See tests/reference/peer_comparison.py for what is measured and how.
#
#   bash tests/peer-comparison.sh PEER.py [FRAMES]      (or PEER=PEER.py bash tests/peer-comparison.sh)
#
# PEER.py is started as `PEER.py PORT ARRAY FRAMES`; it needs what it imports (for paho-mqtt, cbor2 and NumPy on Debian:
# apt-get install python3-paho-mqtt python3-cbor2 python3-numpy), and Mosquitto has to be installed.
set -eu
cd "$(dirname "$0")/.."
peer=${1:-${PEER:?"give the peer's script as the first argument"}}
peer=$(realpath "$peer")
dotnet build -c Release -v q -nologo src/ArrayWatch
/usr/bin/python3 tests/reference/peer_comparison.py "$peer" src/ArrayWatch/bin/Release/net10.0/ArrayWatch "${2:-1000}"
