"""A room may include itself and the rooms above it, never one below; <toml.hpp> has one door."""
import pathlib
import re
import sys

root = pathlib.Path(sys.argv[1])
rooms = re.search(r"set\(STILLCOAT_ROOMS ([a-z ]+)\)", (root / "CMakeLists.txt").read_text()).group(1).split()
problems = []
includes = 0
for file in sorted([*root.glob("include/**/*.hpp"), *root.glob("src/**/*.hpp"), *root.glob("src/**/*.cpp")]):
    parts = file.relative_to(root).parts
    room = parts[2] if parts[0] == "include" else parts[1]
    if room == "main.cpp":
        continue
    for number, line in enumerate(file.read_text().splitlines(), 1):
        match = re.match(r'\s*#include ["<]([^">]+)[">]', line)
        if not match:
            continue
        target = match.group(1)
        where = f"{file.relative_to(root)}:{number}"
        if target == "toml.hpp" and file.name != "document.cpp":
            problems.append(f"{where}: only src/core/document.cpp may include toml.hpp")
        pieces = target.split("/")
        other = pieces[1] if pieces[0] == "stillcoat" else pieces[0]
        if other in rooms and len(pieces) > 1:
            includes += 1
            if rooms.index(other) > rooms.index(room):
                problems.append(f"{where}: {room} must not include {other}")
print(f"{includes} includes between {len(rooms)} rooms, {len(problems)} out of order")
print("\n".join(problems))
sys.exit(1 if problems or includes == 0 else 0)
