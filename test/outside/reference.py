"""Shared by the scripts beside it: each computes expected values with software from outside the project and writes them to data/NAME.json,
with the versions used. Run all of them with: for f in test/outside/[a-q]*.py test/outside/s*.py test/outside/t*.py; do /usr/bin/python3 $f; done
The tests read the JSON files and never run Python."""
import json
import os
import platform
import sys

import mpmath
import numpy
import scipy

HERE = os.path.dirname(os.path.abspath(__file__))


def write(name, method, digits, content, **versions):
    """content: the expected values; digits: how many of them are right; method: how they were found."""
    document = {
        "generator": os.path.basename(sys.argv[0]),
        "method": method,
        "digits": digits,
        "versions": {"python": platform.python_version(), "mpmath": mpmath.__version__, "numpy": numpy.__version__, "scipy": scipy.__version__, **versions},
        **content,
    }
    with open(os.path.join(HERE, "data", name + ".json"), "w") as file:
        json.dump(document, file, indent=1)
        file.write("\n")
    print(name)


def number(x):
    """A double from a high-precision real."""
    return float(x)


def pair(z):
    return {"re": float(mpmath.re(z)), "im": float(mpmath.im(z))}
