#!/usr/bin/env python3
"""Publishes snapshot frames to an MQTT broker as fast as it takes them: 64 channels, 64 bins, 16 snapshots unless stated.

Usage: publish_frames.py PORT ARRAY FRAMES [CHANNELS BINS SNAPSHOTS [INTERVAL]]

MQTT 5 over a plain socket, QoS 1 with at most WINDOW messages not yet acknowledged, CBOR bodies with float32 data in
little-endian order (RFC 8746, tag 85). Only the standard library is needed; the packet is made once and only its time
and sequence number change, so that the publisher costs next to nothing beside what is measured.
"""
import random
import socket
import struct
import sys

WINDOW = 10


def text(s):
    return struct.pack('>H', len(s)) + s.encode()


def variable(n):
    out = bytearray()
    while True:
        n, low = n >> 7, n & 0x7F
        out.append(low | (0x80 if n else 0))
        if not n:
            return bytes(out)


def head(major, n):
    return struct.pack('>BI', major << 5 | 26, n)


def key(s):
    return bytes([0x60 | len(s)]) + s.encode()


def double(x):
    return b'\xfb' + struct.pack('>d', x)


def body(channels, bins, snapshots, interval):
    """A frame, and where its time and its sequence number stand in it."""
    rng = random.Random(1)
    count = 2 * snapshots * bins * channels
    # A pool of noise values, read from a new place for each row: cheap to make and never the same twice in a row.
    pool = [rng.gauss(0, 1) for _ in range(8191)]
    data = struct.pack(f'<{count}f', *[pool[(i * 7919) % 8191] for i in range(count)])
    out = bytearray(b'\xa6' + key('time'))
    time_at = len(out) + 1
    out += double(0) + key('sequence')
    sequence_at = len(out) + 1
    out += b'\x1b' + struct.pack('>Q', 0)
    out += key('interval') + double(interval)
    out += key('frequencies') + head(4, bins) + b''.join(double(100.0 + 10 * i) for i in range(bins))
    out += key('shape') + b'\x83' + head(0, snapshots) + head(0, bins) + head(0, channels)
    out += key('data') + b'\xd8\x55' + head(2, len(data)) + data
    return out, time_at, sequence_at


def receive(sock, n):
    out = b''
    while len(out) < n:
        piece = sock.recv(n - len(out))
        if not piece:
            sys.exit('The broker closed the connection.')
        out += piece
    return out


def packet(sock):
    kind = receive(sock, 1)[0]
    length, shift = 0, 0
    while True:
        b = receive(sock, 1)[0]
        length |= (b & 0x7F) << shift
        shift += 7
        if b < 0x80:
            return kind, receive(sock, length)


def main():
    port, array, frames = int(sys.argv[1]), sys.argv[2], int(sys.argv[3])
    channels, bins, snapshots = (int(a) for a in sys.argv[4:7]) if len(sys.argv) > 6 else (64, 64, 16)
    interval = float(sys.argv[7]) if len(sys.argv) > 7 else 0.1
    payload, time_at, sequence_at = body(channels, bins, snapshots, interval)
    sock = socket.create_connection(('127.0.0.1', port))
    sock.setsockopt(socket.IPPROTO_TCP, socket.TCP_NODELAY, 1)
    connect = text('MQTT') + b'\x05\x02' + struct.pack('>H', 0) + b'\x00' + text('frame-publisher')
    sock.sendall(b'\x10' + variable(len(connect)) + connect)
    kind, answer = packet(sock)
    if kind >> 4 != 2 or answer[1] != 0:
        sys.exit('The broker refuses the connection.')
    topic, properties = text(f'arraywatch/{array}/snapshots'), b'\x03' + text('application/cbor')
    rest = len(topic) + 2 + 1 + len(properties) + len(payload)
    open_ = 0
    for i in range(frames):
        struct.pack_into('>d', payload, time_at, 1_777_608_000 + i * snapshots * interval)
        struct.pack_into('>Q', payload, sequence_at, i)
        sock.sendall(b'\x32' + variable(rest) + topic + struct.pack('>H', 1 + i % 65535) + bytes([len(properties)]) + properties)
        sock.sendall(payload)
        open_ += 1
        while open_ >= WINDOW:
            open_ -= packet(sock)[0] >> 4 == 4
    while open_:
        open_ -= packet(sock)[0] >> 4 == 4
    sock.sendall(b'\xe0\x00')
    sock.close()


main()
