"""An example's appraisal is the expected text: the same words, numbers within a few units of their last digits.
The last printed digit may differ between processors, whose libraries round exp and sin differently."""
import pathlib
import re
import subprocess
import sys

program, folder = sys.argv[1], pathlib.Path(sys.argv[2])
run = subprocess.run([program, "appraise", "design.toml"], cwd=folder, capture_output=True, text=True)
expected = (folder / "expected.txt").read_text()
NUMBER = re.compile(r"[-+]?\d+(?:\.\d+)?(?:e[-+]?\d+)?")


def close(a, b):
    digits = len(a.split("e")[0].replace(".", "").lstrip("-+0"))
    decimals = len(a.split("e")[0].partition(".")[2])
    exponent = int(a.partition("e")[2] or 0)
    return abs(float(a) - float(b)) <= 2.01 * 10.0 ** (exponent - decimals) and digits <= 17


faults = []
if run.returncode != 0:
    faults.append(f"exit code {run.returncode}: {run.stderr}")
got_lines, expected_lines = run.stdout.splitlines(), expected.splitlines()
for number, (got, want) in enumerate(zip(got_lines, expected_lines), 1):
    if NUMBER.sub("#", got).split() != NUMBER.sub("#", want).split() or not all(
            map(close, NUMBER.findall(want), NUMBER.findall(got))):
        faults.append(f"line {number}\n  expected: {want}\n  got:      {got}")
if len(got_lines) != len(expected_lines):
    faults.append(f"{len(got_lines)} lines instead of {len(expected_lines)}")
print("\n".join(faults[:20]) or f"{len(expected_lines)} lines as expected")
sys.exit(1 if faults or not expected_lines else 0)
