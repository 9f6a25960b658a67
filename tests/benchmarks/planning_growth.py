"""Planning time against the size of the library: the same relations copied under other names.

    python tests/benchmarks/planning_growth.py [--repeat 5]

The last line is one JSON object: relations and seconds of each size, and the exponent of a
power law through them. A growth of n log n has an exponent of about 1.1 here.
"""

from __future__ import annotations

import argparse
import json
import math
import sys
import time
from dataclasses import replace
from pathlib import Path

sys.path.insert(0, str(Path(__file__).resolve().parents[2]))

import numpy as np

import calcsheets
from calcsheets.planning import reach, state_problem
from calcsheets.relations import Library, load_library

COPIES = (1, 2, 4, 7, 10)
EXAMPLE = Path(__file__).resolve().parents[2] / "examples" / "receiver-letdown.toml"


def main() -> None:
    """Run the benchmark."""
    parser = argparse.ArgumentParser(description=__doc__.splitlines()[0])
    parser.add_argument("--repeat", type=int, default=5, help="of which the fastest counts")
    repeat = parser.parse_args().repeat
    brief = calcsheets.read_brief(EXAMPLE)
    sizes, seconds = [], []
    for copies in COPIES:
        library = copied(load_library(), copies)
        times = []
        for _ in range(repeat):
            start = time.perf_counter()
            problem = state_problem(brief, library)
            found = reach(problem, {}).needed([item.variable for item in brief.wanted])
            times.append(time.perf_counter() - start)
        sizes.append(len(library.relations))
        seconds.append(min(times))
        print(f"{sizes[-1]} relations: {seconds[-1] * 1000:.1f} ms, {len(found)} steps")
    slope = float(np.polyfit(np.log(sizes), np.log(seconds), 1)[0])
    allowed = math.log(sizes[-1] * math.log(sizes[-1]) / (sizes[0] * math.log(sizes[0]))) / (
        math.log(sizes[-1] / sizes[0])
    )
    print(
        json.dumps(
            {
                "relations": sizes,
                "seconds": [round(value, 5) for value in seconds],
                "exponent": round(slope, 3),
                "n_log_n": round(allowed, 3),
            }
        )
    )


def copied(library: Library, copies: int) -> Library:
    """Return a library that holds each relation so many times, under other names."""
    chapters = tuple(
        replace(
            chapter,
            relations=tuple(
                relation if copy == 0 else replace(relation, name=f"{relation.name}_{copy}")
                for copy in range(copies)
                for relation in chapter.relations
            ),
        )
        for chapter in library.chapters
    )
    return Library(chapters)


if __name__ == "__main__":
    main()
