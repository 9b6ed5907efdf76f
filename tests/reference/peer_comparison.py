#!/usr/bin/env python3
"""Compares whole processes that take snapshot frames from a broker: frames a second and processor time a frame.

Usage: peer_comparison.py PEER SERVICE [FRAMES]

PEER is a Python script started as `PEER PORT ARRAY FRAMES` that prints "ready" when it is subscribed; SERVICE is the built
program ArrayWatch. Each gets 64 channels, 64 bins and 16 snapshots a frame at QoS 1 through a Mosquitto of its own, as fast as
it takes them. The clock runs from the broker's first message to the client until its last acknowledgement, as the
broker logs them; processor time is that of the process, all threads, user and system (/proc/PID/stat), in between.
The service runs twice: with snapshots so close that it decides but a few times, which is what the peer's work compares
with, and with ten snapshots a second, where its decisions over the event time that passes are part of the work.
"""
import json
import os
import pathlib
import re
import shutil
import socket
import subprocess
import sys
import tempfile
import threading
import time

HERE = pathlib.Path(__file__).parent
CHANNELS, BINS, SNAPSHOTS = 64, 64, 16
TICK = os.sysconf('SC_CLK_TCK')
LIMIT = 600


def processor_seconds(pid):
    fields = pathlib.Path(f'/proc/{pid}/stat').read_text().rsplit(')', 1)[1].split()
    return (int(fields[11]) + int(fields[12])) / TICK


class Broker:
    """A Mosquitto whose log tells when messages go to a client and come back acknowledged."""

    def __init__(self, folder):
        with socket.socket() as probe:
            probe.bind(('127.0.0.1', 0))
            self.port = probe.getsockname()[1]
        configuration = folder / 'mosquitto.conf'
        configuration.write_text(f'listener {self.port} 127.0.0.1\nallow_anonymous true\nmax_queued_messages 0\n'
                                 'log_dest stderr\nlog_type all\n')
        executable = shutil.which('mosquitto', path=os.environ.get('PATH', '') + ':/usr/sbin') or sys.exit('mosquitto is not installed.')
        self.process = subprocess.Popen([executable, '-c', str(configuration)], stdout=subprocess.PIPE, stderr=subprocess.STDOUT, text=True)
        self.subscribed = threading.Event()
        self.done = threading.Event()
        self.watch = None
        threading.Thread(target=self._read, daemon=True).start()

    def follow(self, client, topic, frames, pid):
        self.watch = (client, topic, frames, pid)
        self.started = None
        self.acknowledged = 0

    def _read(self):
        for line in self.process.stdout:
            if self.watch is None:
                continue
            client, topic, frames, pid = self.watch
            if f'Sending SUBACK to {client}' in line:
                self.subscribed.set()
            elif self.started is None and f'Sending PUBLISH to {client} ' in line and topic in line:
                self.started = (time.perf_counter(), processor_seconds(pid))
            elif f'Received PUBACK from {client} ' in line:
                self.acknowledged += 1
                if self.acknowledged == frames:
                    self.ended = (time.perf_counter(), processor_seconds(pid))
                    self.done.set()

    def measure(self, name, frames, interval):
        subprocess.run([sys.executable, HERE / 'publish_frames.py', str(self.port), 'aft', str(frames),
                        str(CHANNELS), str(BINS), str(SNAPSHOTS), str(interval)], check=True)
        if not self.done.wait(LIMIT):
            sys.exit(f'{name}: only {self.acknowledged} of {frames} frames were acknowledged within {LIMIT} s.')
        seconds = self.ended[0] - self.started[0]
        processor = self.ended[1] - self.started[1]
        print(f'{name:58s} {frames / seconds:8.1f} frames/s   {1000 * processor / frames:8.3f} ms of processor time a frame', flush=True)
        return frames / seconds, processor / frames

    def close(self):
        self.process.terminate()
        self.process.wait()


def run_peer(script, frames):
    with tempfile.TemporaryDirectory() as folder:
        broker = Broker(pathlib.Path(folder))
        # The peer leaves after its last frame, before the broker can log that acknowledgement; it is given one frame too few.
        peer = subprocess.Popen([sys.executable, script, str(broker.port), 'aft', str(frames + 1)], stdout=subprocess.PIPE, text=True)
        try:
            broker.follow('peer', 'snapshots', frames, peer.pid)
            if not broker.subscribed.wait(60):
                sys.exit('The peer did not subscribe.')
            return broker.measure('peer', frames, 0.1)
        finally:
            peer.kill()
            peer.wait()
            broker.close()


def run_service(program, frames, interval, name):
    with tempfile.TemporaryDirectory() as folder:
        folder = pathlib.Path(folder)
        broker = Broker(folder)
        configuration = folder / 'arraywatch.json'
        configuration.write_text(json.dumps({
            'broker': {'embedded': False, 'host': '127.0.0.1', 'port': broker.port},
            'store': {'path': str(folder / 'arraywatch.db')},
            'arrays': [{'id': 'aft', 'medium': {'soundSpeed': 1500},
                        'line': {'count': CHANNELS, 'spacing': 0.75, 'axis': [1, 0, 0], 'labelPrefix': 'H', 'firstLabel': 1, 'groupSize': 8}}]}))
        log = open(folder / 'log', 'w')
        service = subprocess.Popen([program, 'run', '--config', str(configuration)], stdout=log, stderr=subprocess.STDOUT, cwd=folder)
        try:
            broker.follow('arraywatch-aft', 'snapshots', frames, service.pid)
            if not broker.subscribed.wait(60):
                sys.exit('The service did not subscribe:\n' + (folder / 'log').read_text())
            return broker.measure(name, frames, interval)
        finally:
            service.terminate()
            service.wait()
            log.close()
            broker.close()


def main():
    if len(sys.argv) < 3:
        sys.exit(re.search(r'Usage: .*', __doc__).group())
    peer, service = sys.argv[1], os.path.abspath(sys.argv[2])
    frames = int(sys.argv[3]) if len(sys.argv) > 3 else 1000
    peer_rate, peer_cost = run_peer(peer, frames)
    rate, cost = run_service(service, frames, 0.001, 'service, 1000 snapshots a second of event time')
    run_service(service, frames, 0.1, 'service, 10 snapshots a second of event time')
    print(f'service against peer: {rate / peer_rate:.2f} times the frames, {peer_cost / cost:.2f} times less processor time a frame')


main()
