"""check_layers.py ROOT: which folder of src/ includes what.

Links point one way because CMake says so; outside headers are open to every folder as far
as the compiler is concerned, so this table is what keeps each library in its one place.
"""
import pathlib
import re
import sys

# Folders in pipeline order: a folder includes only its own headers and those above it.
ORDER = ["base", "units", "hydro", "model", "casefile", "steady", "surge", "thrust",
         "restraint", "crosscheck", "job", "report", "app"]

STANDARD = {"assert.h", "ctype.h", "errno.h", "float.h", "inttypes.h", "limits.h",
            "math.h", "stdarg.h", "stdbool.h", "stddef.h", "stdint.h", "stdio.h",
            "stdlib.h", "string.h", "strings.h"}

# What else a folder may see.
OUTSIDE = {
    "base": {"pthread.h", "stdatomic.h", "unistd.h", "fcntl.h", "dirent.h",
             "sys/file.h", "sys/stat.h", "fts.h"},
    "units": {"udunits2.h", "locale.h"},
    "casefile": {"libconfig.h", "csv.h", "locale.h", "sys/stat.h", "unistd.h", "dirent.h",
                 "libgen.h"},
    "steady": {"kinsol/kinsol.h", "nvector/nvector_serial.h", "klu.h",
               "sundials/sundials_types.h", "sundials/sundials_linearsolver.h",
               "sundials/sundials_matrix.h", "sundials/sundials_context.h",
               "sundials/sundials_nvector.h", "sundials/sundials_math.h",
               "sunmatrix/sunmatrix_sparse.h"},
    "crosscheck": {"ida/ida.h", "nvector/nvector_serial.h", "sunlinsol/sunlinsol_klu.h",
                   "sunmatrix/sunmatrix_sparse.h"},
    "job": {"unistd.h"},
    "report": {"jansson.h"},
    "app": {"argp.h", "locale.h", "unistd.h", "signal.h", "fcntl.h", "stdio_ext.h"},
}

INCLUDE = re.compile(r'^\s*#\s*include\s+([<"])([^>"]+)[>"]', re.M)


def main(root):
    src = pathlib.Path(root) / "src"
    folders = [d for d in src.iterdir() if d.is_dir()]
    home = {h.name: d.name for d in folders for h in d.glob("*.h")}
    faults, seen = [], 0
    for folder in folders:
        if folder.name not in ORDER:
            faults.append(f"{folder}: a folder that is not in the pipeline")
            continue
        rank = ORDER.index(folder.name)
        for file in sorted(folder.glob("*.[ch]")):
            for kind, name in INCLUDE.findall(file.read_text()):
                seen += 1
                if kind == '"':
                    where = home.get(name)
                    if where is None:
                        faults.append(f"{file}: \"{name}\" is nowhere in src/")
                    elif ORDER.index(where) > rank:
                        faults.append(f"{file}: \"{name}\" belongs to the later {where}/")
                    elif name.endswith("_internal.h") and where != folder.name:
                        faults.append(f"{file}: \"{name}\" is internal to {where}/")
                elif name not in STANDARD | OUTSIDE.get(folder.name, set()):
                    faults.append(f"{file}: <{name}> is not for {folder.name}/")
    if not seen:
        faults.append("no include lines found")
    print("\n".join(faults) or f"{seen} include lines, all as the table says")
    return 1 if faults else 0


if __name__ == "__main__":
    sys.exit(main(sys.argv[1]))
