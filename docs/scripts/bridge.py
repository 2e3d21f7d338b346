"""A bridge for one machine: takes signed calls, samples what a bundle programmes, sends the samples back.

BRIDGE_SECRET  the secret that the page of the machine's bridge showed
BRIDGE_PORT    where it listens on this machine, 8400 where nothing is said
"""
import base64, hashlib, hmac, io, json, os, random, threading, time, urllib.request, zipfile
from http.server import BaseHTTPRequestHandler, ThreadingHTTPServer

SECRET = os.environ["BRIDGE_SECRET"].encode()
seen = set()

def is_ours(headers, body):
    stamp = headers.get("Espalier-Timestamp", "")
    if not stamp.isdecimal() or abs(time.time() - int(stamp)) > 300:
        return False
    expected = hmac.new(SECRET, stamp.encode() + b"." + body, hashlib.sha256).hexdigest()
    given = [part.strip().partition("=")[2] for part in headers.get("Espalier-Signature", "").split(",")]
    return any(hmac.compare_digest(signature.encode(), expected.encode()) for signature in given)

def sampled(problem, reads):
    """Descents from random spins by flips that lower the energy. Here your machine would be asked."""
    h = {int(qubit): value for qubit, value in problem["h"].items()}
    near, rows = {qubit: [] for qubit in h}, []
    for a, b, value in problem["J"]:
        near[a].append((b, value))
        near[b].append((a, value))
    for _ in range(reads):
        spin = {qubit: random.choice((-1, 1)) for qubit in h}
        gain = lambda q: spin[q] * (h[q] + sum(value * spin[other] for other, value in near[q]))
        while flips := [q for q in h if gain(q) > 1e-12]:
            for q in flips:
                spin[q] *= -1 if gain(q) > 1e-12 else 1
        rows.append(list(spin.values()))
    return json.dumps({"kind": "espalier.samples", "version": 1, "qubits": list(h), "samples": rows}).encode()

def run(call):
    url, kind = call["return"]["samplesUrl"], "multipart/form-data; boundary=part"
    try:
        archive = zipfile.ZipFile(io.BytesIO(base64.b64decode(call["bundle"]["base64"])))
        problem = next(name for name in archive.namelist() if name.endswith("/problem.json"))
        body = b'--part\r\nContent-Disposition: form-data; name="file"; filename="samples.json"\r\n\r\n'
        body += sampled(json.loads(archive.read(problem)), call["runSheet"]["reads"]) + b"\r\n--part--\r\n"
    except Exception as fault:
        url, kind, body = call["return"]["refusalUrl"], "application/json", json.dumps({"reason": repr(fault)}).encode()
    headers = {"Authorization": "Bearer " + call["return"]["token"], "Content-Type": kind}
    urllib.request.urlopen(urllib.request.Request(url, body, headers))

class Bridge(BaseHTTPRequestHandler):
    def do_POST(self):
        body = self.rfile.read(int(self.headers["Content-Length"]))
        self.send_response(202 if is_ours(self.headers, body) else 401)
        self.end_headers()
        call = json.loads(body) if is_ours(self.headers, body) else {}
        if call.get("event") == "run" and call["call"] not in seen:
            seen.add(call["call"])
            threading.Thread(target=run, args=[call]).start()

ThreadingHTTPServer(("127.0.0.1", int(os.environ.get("BRIDGE_PORT", 8400))), Bridge).serve_forever()
