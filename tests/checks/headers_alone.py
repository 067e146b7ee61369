"""Every public header compiles alone."""
import pathlib
import subprocess
import sys

root, compiler = pathlib.Path(sys.argv[1]), sys.argv[2]
failed = 0
headers = sorted(root.glob("include/stillcoat/**/*.hpp"))
for header in headers:
    source = f'#include "{header.relative_to(root / "include")}"\n#include "{header.relative_to(root / "include")}"\n'
    run = subprocess.run([compiler, "-std=c++20", "-fsyntax-only", "-Wall", "-Wextra", "-Werror",
                          f"-I{root / 'include'}", "-x", "c++", "-"], input=source, text=True,
                         capture_output=True)
    if run.returncode != 0:
        failed += 1
        print(f"{header.relative_to(root)} does not compile alone:\n{run.stderr}")
print(f"{len(headers)} headers, {failed} do not compile alone")
sys.exit(1 if failed or not headers else 0)
