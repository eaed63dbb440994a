"""Fails on an include that points to the right in the order of modules, and on stray sources.

Usage: check_includes.py ROOT
"""

import pathlib
import re
import sys

ORDER = [
    ["math"],
    ["catalog"],
    ["lattice"],
    ["bands"],
    ["response"],
    ["shell", "wire", "sheet"],
    ["join", "contact"],
    ["pair"],
    ["sweep", "table", "report"],
    ["capi", "cli"],
]
RANK = {module: rank for rank, modules in enumerate(ORDER) for module in modules}
SUFFIXES = {".cpp", ".hpp", ".c", ".h"}
INCLUDE = re.compile(r'^\s*#\s*include\s*([<"])([^>"]+)[>"]')


def problem_of(path, module, bracket, target):
    """What is wrong with one include of a file of a module, or None."""
    if bracket == '"':
        inside = "/" not in target and (path.parent / target).is_file()
        return None if inside else f'"{target}" is not a header of this folder'
    if not target.startswith("gapwright/"):
        return None
    parts = target.split("/")
    if len(parts) < 3 or parts[1] not in RANK:
        return f"<{target}> belongs to no module"
    if parts[1] != module and RANK[parts[1]] >= RANK[module]:
        return f"<{target}>: {module} must not include {parts[1]}"
    return None


def problems(root):
    found = []
    for base in (root / "include" / "gapwright", root / "src"):
        for path in sorted(base.rglob("*")):
            if path.suffix not in SUFFIXES:
                continue
            inner = path.relative_to(base).parts
            module = inner[0]
            if len(inner) < 2 or module not in RANK:
                found.append(f"{path}: outside the known modules")
                continue
            for number, line in enumerate(path.read_text("utf-8").splitlines(), 1):
                match = INCLUDE.match(line)
                problem = match and problem_of(path, module, *match.groups())
                if problem:
                    found.append(f"{path}:{number}: {problem}")
    return found


def main():
    found = problems(pathlib.Path(sys.argv[1]))
    print("\n".join(found) if found else "every include points left")
    return 1 if found else 0


if __name__ == "__main__":
    sys.exit(main())
