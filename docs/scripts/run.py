"""Runs a problem from the coefficient file to the best assignment, with Python's own library and NumPy.

ESPALIER_URL             address of the server, http://127.0.0.1:3000 where nothing is said
ESPALIER_TOKEN           a token with the role developer: People, Tokens
ESPALIER_REVIEWER_TOKEN  a token of another person, with the role reviewer: nobody approves a run sheet of their own
RUN_SHEET                an approved run sheet to go on with, where there is no such token
"""

import io
import json
import os
import sys
import time
import urllib.error
import urllib.request
import uuid

import numpy as np

URL = os.environ.get("ESPALIER_URL", "http://127.0.0.1:3000")
DEVELOPER = os.environ.get("ESPALIER_TOKEN") or sys.exit("ESPALIER_TOKEN: make one under People, Tokens.")
REVIEWER = os.environ.get("ESPALIER_REVIEWER_TOKEN")
READS = 100


def ask(method, path, body=None, content_type="application/json", token=DEVELOPER):
    """The JSON answer. A lost answer is asked for again with the same key, so that nothing is done twice, and after waiting where asked to."""
    headers = {"Authorization": f"Bearer {token}", "Idempotency-Key": str(uuid.uuid4())}
    if body is not None:
        headers["Content-Type"] = content_type
        body = body if isinstance(body, bytes) else json.dumps(body).encode()
    request = urllib.request.Request(URL + path, body, headers, method=method)
    for attempt in range(4):
        try:
            with urllib.request.urlopen(request) as answer:
                return json.load(answer)
        except urllib.error.HTTPError as refused:
            if refused.code == 429 and attempt < 3:
                time.sleep(int(refused.headers["Retry-After"]))
                continue
            sys.exit(f"{method} {path}: {json.load(refused)['data']['message']}")
        except OSError:
            if attempt == 3:
                raise
            time.sleep(2**attempt)


def send_file(path, file_name, contents, **fields):
    """Sends a file as the part `file` of a form, other parts beside it."""
    boundary = uuid.uuid4().hex
    form = io.BytesIO()
    for field, value in fields.items():
        form.write(f'--{boundary}\r\nContent-Disposition: form-data; name="{field}"\r\n\r\n{value}\r\n'.encode())
    form.write(f'--{boundary}\r\nContent-Disposition: form-data; name="file"; filename="{file_name}"\r\n\r\n'.encode())
    form.write(contents + f"\r\n--{boundary}--\r\n".encode())
    return ask("POST", path, form.getvalue(), f"multipart/form-data; boundary={boundary}")


def finished(job_id):
    while (job := ask("GET", f"/api/jobs/{job_id}"))["status"] in ("queued", "running"):
        time.sleep(0.3)
    if job["status"] != "done":
        sys.exit(f"The job is {job['status']}: {job['message']}")


def prepared():
    """The id of an approved run sheet for a problem of twelve spins with random couplings."""
    random = np.random.default_rng(1)
    pairs = [(i, j) for i in range(12) for j in range(i) if random.random() < 0.35]
    lines = "".join(f"s{i} s{j} {random.choice([-1, 1])}\n" for i, j in pairs)
    problem = send_file("/api/problems", "spins.txt", lines.encode(), form="ising", name="Twelve spins")
    machine = ask("GET", "/api/machines?limit=1")["items"][0]
    embedding = ask("POST", "/api/embeddings", {"problemId": problem["id"], "machineId": machine["id"]})
    finished(embedding["jobId"])
    settings = {"embeddingId": embedding["id"], "name": "By script", "reads": READS}
    sheet = ask("POST", "/api/run-sheets", settings)["id"]
    ask("POST", f"/api/run-sheets/{sheet}/submit", {"remark": "Prepared by a script."})
    if not REVIEWER:
        print(f"A reviewer decides at {URL}/run-sheets/{sheet}. Once it is approved, set RUN_SHEET={sheet}.")
        sys.exit()
    ask("POST", f"/api/run-sheets/{sheet}/approve", {}, token=REVIEWER)
    return sheet


def sampled(programmed):
    """What the machine would do: descents from random spins, each by single flips that lower the energy."""
    qubits = sorted({int(q) for q in programmed["h"]} | {q for a, b, _ in programmed["J"] for q in (a, b)})
    at = {qubit: i for i, qubit in enumerate(qubits)}
    h = np.zeros(len(qubits))
    J = np.zeros((len(qubits), len(qubits)))
    for qubit, value in programmed["h"].items():
        h[at[int(qubit)]] = value
    for a, b, value in programmed["J"]:
        J[at[a], at[b]] = J[at[b], at[a]] = value
    spins = np.random.default_rng(2).choice([-1, 1], (READS, len(qubits)))
    for row in spins:
        while (gains := row * (h + J @ row)).max() > 1e-12:
            row[gains.argmax()] *= -1
    return qubits, spins


sheet = os.environ.get("RUN_SHEET") or prepared()
ask("POST", f"/api/run-sheets/{sheet}/issue", {})
qubits, spins = sampled(ask("GET", f"/api/run-sheets/{sheet}/programmed"))
archive = io.BytesIO()
np.savez_compressed(archive, samples=spins.astype("i1"), qubits=qubits)
returned = send_file(f"/api/run-sheets/{sheet}/returns", "samples.npz", archive.getvalue())
best = ask("GET", f"/api/returns/{returned['id']}/solutions?limit=1")["items"][0]
print(f"Energy {best['energy']}, found {best['count']} times in {returned['reads']} reads:")
for label, value in best["assignment"].items():
    print(f"{label} {value}")
