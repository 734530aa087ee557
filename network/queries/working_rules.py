"""The agency's limits, and those among them that the kernel asks for together."""

from network.models import WorkingRules
from network.numerics.levels.levelling import LevelLimits

PEG_TEST_SIGHT_M = 50  # the length over which the agency states its limit of collimation


def rules() -> WorkingRules:
    """Return the working rules, or an unsaved row with the defaults before set-up has run."""
    return WorkingRules.objects.filter(pk=1).first() or WorkingRules(pk=1)


def level_limits(of: WorkingRules) -> LevelLimits:
    """Return the limits of a run of levels."""
    return LevelLimits(
        misclosure_mm_per_root=of.level_closure_mm,
        misclosure_cap_mm=of.level_closure_cap_mm,
        plate_tolerance_mm=of.level_tolerance_mm,
        benchmark_tolerance_mm=of.level_tolerance_mm,
    )


def collimation_limit_mm_per_m(of: WorkingRules) -> float:
    """Return the greatest collimation error of a level."""
    return of.peg_test_limit_mm / PEG_TEST_SIGHT_M
