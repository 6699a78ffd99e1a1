"""Drives kvane from Python with the standard library alone: one process, any number of requests.

    python3 batch.py            if kvane is on the path
    python3 batch.py node packages/cli/bin/kvane.js
"""

import json
import subprocess
import sys


class KvaneError(Exception):
    """What kvane has to say against a request; `problems` has code, place, expected, found and remedy."""

    def __init__(self, problems):
        super().__init__(problems[0]["message"])
        self.problems = problems


class Kvane:
    """A running `kvane batch`. Use it in a `with` statement."""

    def __init__(self, program=("kvane",)):
        self.process = subprocess.Popen(
            [*program, "batch", "--quiet"],
            stdin=subprocess.PIPE,
            stdout=subprocess.PIPE,
            encoding="utf-8",
        )

    def __enter__(self):
        return self

    def __exit__(self, *_):
        self.process.stdin.close()
        self.process.wait()

    def ask(self, command, texts=None, **fields):
        """The result of a command; fields as in `kvane help requests`, texts of files by their names."""
        request = {"command": command, "texts": texts, **fields}
        self.process.stdin.write(json.dumps(request) + "\n")
        self.process.stdin.flush()
        answer = json.loads(self.process.stdout.readline())
        if answer["errors"]:
            raise KvaneError(answer["errors"])
        return answer["result"]


STUDY = """
title: From Python (invented)
group: P n m a
cell: {a: 10.21, b: 6.05, c: 4.71, alpha: 90, beta: 90, gamma: 90}
peaks: {file: peaks.txt, as: d}
"""
PEAKS = "7.803 0.02\n4.703 0.02\n4.389 0.02\n"


def main():
    with Kvane(sys.argv[1:] or ["kvane"]) as kvane:
        for group, k in [("P n m a", "0,0,0"), ("P n m a", "0,1/2,0"), ("P 63/m m c", "1/3,1/3,0")]:
            irreps = kvane.ask("irreps", group=group, k=k)["irreps"]
            dimensions = " ".join(str(irrep["dimension"]) for irrep in irreps)
            print(f"{group} at ({k}): dimensions {dimensions}")

        found = kvane.ask("index", texts={"study.yaml": STUDY, "peaks.txt": PEAKS}, study="study.yaml", k="0,1/2,0")
        candidate = found["candidates"][0]
        print(f"(0,1/2,0) explains {candidate['matched']} of {candidate['total']} peaks")

        try:
            kvane.ask("star", group="P n q a", k="0,0,0")
        except KvaneError as error:
            print(f"{error.problems[0]['code']}: {error}")


if __name__ == "__main__":
    main()
