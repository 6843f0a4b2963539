"""One way: each layer imports only from those before it; rules hold no code."""

from __future__ import annotations

import ast
from pathlib import Path

import pytest

ROOT = Path(__file__).parent.parent.parent
LAYERS = (
    ("refusal", "cautions", "rule_folder"),
    ("vocabulary",),
    ("expression",),
    ("fleet",),
    ("engineering",),
    ("intake",),
    ("limits",),
    ("derivation",),
    ("checks",),
    ("findings",),
    ("explain",),
    ("report",),
    ("pipeline",),
    ("commands",),
    ("cli",),
)
RANK = {name: rank for rank, names in enumerate(LAYERS) for name in names}
ENGINEERING_MAY_USE = {"engineering"}


def backward_imports(file: str, text: str) -> list[str]:
    """Give the imports of a module of audit/ that lead to a later layer."""
    own = Path(file).parts[1].removesuffix(".py")
    found = []
    for node in ast.walk(ast.parse(text)):
        names = []
        if isinstance(node, ast.ImportFrom) and node.module:
            names = [node.module] if node.module != "audit" else [f"audit.{alias.name}" for alias in node.names]
        elif isinstance(node, ast.Import):
            names = [alias.name for alias in node.names]
        for name in names:
            parts = name.split(".")
            if parts[0] != "audit" or len(parts) < 2:
                continue
            target = parts[1]
            forbidden = own == "engineering" and target not in ENGINEERING_MAY_USE
            if forbidden or RANK[target] > RANK[own]:
                found.append(f"{file}: {name}")
    return found


FILES = sorted(
    path.relative_to(ROOT).as_posix()
    for path in (ROOT / "audit").rglob("*.py")
    if path.name != "__init__.py" or len(path.parts) > len(ROOT.parts) + 2
)


@pytest.mark.parametrize("file", FILES)
def test_a_module_imports_only_from_layers_before_it(file: str) -> None:
    assert backward_imports(file, (ROOT / file).read_text("utf-8")) == []


def test_a_planted_backward_import_is_found() -> None:
    assert backward_imports("audit/engineering/planted.py", "from audit.report import cautions\n")
    assert backward_imports("audit/fleet/planted.py", "import audit.checks.entry\n")


def test_rules_hold_no_code() -> None:
    assert {path.suffix for path in (ROOT / "rules").rglob("*") if path.is_file()} <= {".toml", ".md"}
