"""Checks a bag (RFC 8493, BagIt 1.0) and the custody chain in it.

Written from the RFC with Python's standard library alone; it shares nothing with the program that
made the bag. Use: python3 verify_bag.py BAG_FOLDER. Prints what is wrong, one a line; ends with 0
if nothing is.
"""

import hashlib
import json
import os
import re
import sys

ALGORITHMS = ("sha256", "sha512")


def digest(path, algorithm):
    total = hashlib.new(algorithm)
    with open(path, "rb") as stream:
        for block in iter(lambda: stream.read(1 << 20), b""):
            total.update(block)
    return total.hexdigest()


def decode(path):
    """Only LF, CR and % are percent-encoded (2.1.3)."""
    return re.sub("%(0A|0D|25)", lambda m: chr(int(m.group(1), 16)), path, flags=re.I)


def safe(path):
    """5.1: nothing outside the bag, on any system."""
    return not (
        path.startswith(("/", "~", "\\"))
        or re.match("[A-Za-z]:", path)
        or "\\" in path
        or any(part in ("", ".", "..") for part in path.split("/"))
    )


def read_manifest(bag, name, payload, wrong):
    listed = {}
    with open(os.path.join(bag, name), encoding="utf-8", newline="") as stream:
        content = stream.read()
    if not content.endswith("\n"):
        wrong(f"{name}: last line has no end")
    for line in content.split("\n")[:-1]:
        match = re.fullmatch(r"([0-9a-fA-F]+)[ \t]+(.+)", line.rstrip("\r"))
        if not match:
            wrong(f"{name}: line cannot be read: {line!r}")
            continue
        path = decode(match.group(2))
        if not safe(path) or path.startswith("data/") != payload:
            wrong(f"{name}: path is not allowed: {path!r}")
        elif path in listed:
            wrong(f"{name}: path is listed twice: {path!r}")
        else:
            listed[path] = match.group(1).lower()
    return listed


def files_of(bag):
    found = set()
    for folder, _, names in os.walk(bag):
        for name in names:
            path = os.path.relpath(os.path.join(folder, name), bag)
            found.add(path.replace(os.sep, "/"))
    return found


def check_bag(bag, wrong):
    with open(os.path.join(bag, "bagit.txt"), "rb") as stream:
        declared = stream.read()
    if declared != b"BagIt-Version: 1.0\nTag-File-Character-Encoding: UTF-8\n":
        wrong("bagit.txt: is not the declaration of BagIt 1.0 in UTF-8")
    files = files_of(bag)
    payload = {path for path in files if path.startswith("data/")}
    manifests = [f"manifest-{a}.txt" for a in ALGORITHMS]
    for algorithm in ALGORITHMS:
        name = f"manifest-{algorithm}.txt"
        listed = read_manifest(bag, name, True, wrong)
        compare(bag, name, algorithm, listed, wrong)
        for path in sorted(payload - set(listed)):
            wrong(f"{name}: does not list {path}")
        name = f"tagmanifest-{algorithm}.txt"
        listed = read_manifest(bag, name, False, wrong)
        compare(bag, name, algorithm, listed, wrong)
        for path in ["bagit.txt", "bag-info.txt", *manifests]:
            if path not in listed:
                wrong(f"{name}: does not list {path}")
    with open(os.path.join(bag, "bag-info.txt"), encoding="utf-8") as stream:
        sums = re.findall(r"^Payload-Oxum: (\d+)\.(\d+)$", stream.read(), re.M)
    octets = sum(os.path.getsize(os.path.join(bag, path)) for path in payload)
    if sums != [(str(octets), str(len(payload)))]:
        wrong(f"bag-info.txt: Payload-Oxum should be {octets}.{len(payload)}")


def compare(bag, name, algorithm, listed, wrong):
    for path, stated in listed.items():
        full = os.path.join(bag, *path.split("/"))
        if not os.path.isfile(full):
            wrong(f"{name}: {path} is missing")
        elif digest(full, algorithm) != stated:
            wrong(f"{name}: {path} has another {algorithm}")


def check_chain(bag, wrong):
    """Each event holds the SHA-256 of the one before; the last one names the released snapshot."""
    previous = "0" * 64
    last = ""
    with open(os.path.join(bag, "data/custody/ledger.jsonl"), "rb") as stream:
        lines = stream.read().split(b"\n")
    for number, line in enumerate(lines[:-1], start=1):
        event = json.loads(line.decode("utf-8"))
        if event["sequence"] != number:
            wrong(f"ledger: event {number} has another number")
        if "previous" in event:
            if event["previous"] != previous:
                wrong(f"ledger: event {number} does not follow the one before")
            previous = hashlib.sha256(line).hexdigest()
        else:
            previous = event["hash"]
        last = event.get("note", "")
    with open(os.path.join(bag, "data/custody/head.json"), encoding="utf-8") as stream:
        head = json.load(stream)
    if (head["hash"], head["sequence"]) != (previous, len(lines) - 1):
        wrong("ledger: the signed head is not that of the last event")
    if digest(os.path.join(bag, "data/release.json"), "sha256") not in last:
        wrong("release.json: is not what the last event of the ledger released")


def main(bag):
    errors = []
    for check in (check_bag, check_chain):
        try:
            check(bag, errors.append)
        except (OSError, ValueError, KeyError, TypeError) as error:
            errors.append(f"{check.__name__}: {error}")
    for error in errors:
        print(error)
    print("The bag is valid." if not errors else f"{len(errors)} things are wrong.")
    return 1 if errors else 0


if __name__ == "__main__":
    sys.exit(main(sys.argv[1]))
