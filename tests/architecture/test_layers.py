"""Imports flow one way. The table below is the architecture; the test reads it."""

import ast
import subprocess
import sys
from pathlib import Path

import pytest

ROOT = Path(__file__).resolve().parents[2]

# package -> the first-party packages it may import (besides itself)
MAY_IMPORT = {
    "network.numerics": [],
    "network.formats": [],
    "network.models": ["network.numerics"],
    "network.queries": ["network.models", "network.numerics"],
    "network.services": [
        "network.queries",
        "network.models",
        "network.numerics",
        "network.formats",
    ],
    "network.admin": ["network.services", "network.queries", "network.models"],
    "network.web": [
        "network.services",
        "network.queries",
        "network.models",
        "network.formats",
    ],
    "network.management": ["network.services", "network.queries", "network.formats"],
    "reports": [
        "network.queries",
        "network.models",
        "network.numerics",
        "network.formats",
        "network.services.acts",
        "network.services.jobs",
        "network.services.station_years",  # the cache
        "network.templatetags",
    ],
    "reports.figures": ["network.numerics"],
}
NO_DJANGO = {"network.numerics", "network.formats", "reports.figures"}


def imports_of(package):
    """Yield (file, line, dotted name) for every import below a package."""
    for path in sorted((ROOT / package.replace(".", "/")).rglob("*.py")):
        for node in ast.walk(ast.parse(path.read_text())):
            if isinstance(node, ast.Import):
                names = [alias.name for alias in node.names]
            elif isinstance(node, ast.ImportFrom):
                assert node.level == 0, f"{path}:{node.lineno} relative import"
                names = [node.module]
            else:
                continue
            yield from ((path.relative_to(ROOT), node.lineno, name) for name in names)


def within(name, packages):
    return any(name == p or name.startswith(p + ".") for p in packages)


@pytest.mark.parametrize("package", MAY_IMPORT)
def test_package_imports_only_what_lies_below_it(package):
    allowed = [*MAY_IMPORT[package], package]
    offences = [
        f"{path}:{line} imports {name}"
        for path, line, name in imports_of(package)
        if within(name, {"network", "reports"}) and not within(name, allowed)
    ]
    assert offences == []


@pytest.mark.parametrize("package", sorted(NO_DJANGO))
def test_package_runs_without_django(package):
    """Import every module of the package in a process where Django cannot load."""
    program = (
        "import sys, pkgutil, importlib; sys.modules['django'] = None\n"
        f"root = importlib.import_module({package!r})\n"
        "for m in pkgutil.walk_packages(root.__path__, root.__name__ + '.'):\n"
        "    importlib.import_module(m.name)\n"
    )
    done = subprocess.run([sys.executable, "-c", program], cwd=ROOT, capture_output=True, text=True)
    assert done.returncode == 0, done.stderr


def test_every_package_is_in_the_table():
    packages = {
        f"network.{path.name}"
        for path in (ROOT / "network").iterdir()
        if (path / "__init__.py").exists()
    }
    glue = {"network.config", "network.migrations", "network.templatetags"}
    assert packages - glue <= set(MAY_IMPORT)


WRITES = {
    "save",
    "create",
    "get_or_create",
    "update_or_create",
    "bulk_create",
    "bulk_update",
}


# Calls of these names that write no row: a workbook or a PDF saved, a service of that name.
NOT_A_ROW = {
    "network/admin/gaugings.py:gaugings.save",
    "network/formats/gauging_sheet_writer.py:workbook.save",
    "reports/rendering.py:document.save",
    "reports/volumes.py:volume.save",
}


def test_only_services_write_to_the_database():
    """ModelAdmin saves registry rows itself; SAVED_BY_ADMIN in network/admin lists which."""
    offences = [
        f"{path.relative_to(ROOT)}:{node.lineno} calls .{node.func.attr}()"
        for package in ("network", "reports")
        for path in sorted((ROOT / package).rglob("*.py"))
        if not {"migrations", "services", "services.py"} & set(path.parts)
        for node in ast.walk(ast.parse(path.read_text()))
        if isinstance(node, ast.Call)
        and isinstance(node.func, ast.Attribute)
        and node.func.attr in WRITES
        and f"{path.relative_to(ROOT)}:{ast.unparse(node.func)}" not in NOT_A_ROW
    ]
    assert offences == []


def test_import_contracts_hold():
    from importlinter.cli import lint_imports

    assert lint_imports(no_cache=True) == 0
