"""Ratios of times measured side by side in one run, and what each is to hold."""

import statistics
import time
from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass
from pathlib import Path

Work = Callable[[], object]


@dataclass(frozen=True)
class Ratio:
    """A measured ratio and its bound: at most `hold`, or at least where `at_least` says so."""

    what: str
    value: float
    hold: float
    at_least: bool = False
    unit: str = "×"
    remark: str = ""

    @property
    def holds(self) -> bool:
        """Whether the ratio is within its bound."""
        return self.value >= self.hold if self.at_least else self.value <= self.hold

    def __str__(self) -> str:
        sign = "≥" if self.at_least else "≤"
        told = "" if self.holds else "   OUT OF HOLD"
        beside = f"   {self.remark}" if self.remark else ""
        return (
            f"{self.what:<62}{self.value:8.2f} {self.unit:<3}"
            f" (hold {sign} {self.hold:g}){told}{beside}"
        )


class Medians(dict[str, float]):
    """The median seconds of each work, and the median ratio of two of them, turn by turn.

    Machines go faster and slower over minutes; two works of one turn share the weather.
    """

    def __init__(self, taken: Mapping[str, Sequence[float]]) -> None:
        super().__init__({name: statistics.median(each) for name, each in taken.items()})
        self._turns = taken

    def ratio(self, over: str, under: str) -> float:
        """Return the median, over the turns, of one work's seconds over another's."""
        pairs = zip(self._turns[over], self._turns[under], strict=True)
        return statistics.median(above / below for above, below in pairs)


def medians(
    works: Mapping[str, Work],
    *,
    runs: int,
    clock: Callable[[], float] = time.perf_counter,
    prepare: Work = lambda: None,
) -> Medians:
    """Return the median seconds of each work, the works taking turns; one round goes before.

    prepare is done before each round and not measured.
    """
    taken: dict[str, list[float]] = {name: [] for name in works}
    for turn in range(runs + 1):
        prepare()
        for name, work in works.items():
            begun = clock()
            work()
            if turn:
                taken[name].append(clock() - begun)
    return Medians(taken)


def milliseconds(**seconds: float) -> str:
    """Write times behind a ratio."""
    return ", ".join(f"{name} {1000 * each:.1f} ms" for name, each in seconds.items())


def resident_mb(*, peak: bool = False) -> float:
    """Return the memory this process holds now, or held at its most, in MB (Linux).

    The peak is not asked of getrusage: there a process begins with that of the one that made it.
    """
    field = "VmHWM:" if peak else "VmRSS:"
    lines = Path("/proc/self/status").read_text().splitlines()
    return next(int(line.split()[1]) for line in lines if line.startswith(field)) / 1024
