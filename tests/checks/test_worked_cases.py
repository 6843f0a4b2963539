"""Every worked case of every check, through the real evaluator; and whether the cases would notice a fault."""

from __future__ import annotations

from collections import defaultdict
from dataclasses import replace

import pytest

from audit.checks.cases import run_case, run_cases
from audit.checks.catalogue import Catalogue, load_catalogue
from audit.checks.entry import Case, Check

CATALOGUE = load_catalogue()
WORKED = [(check, case) for check in CATALOGUE.checks for case in check.cases]
WITH_CASES = [check for check in CATALOGUE.checks if check.cases]
CONTRARY = {"at_least": "at_most", "at_most": "at_least", "above": "below", "below": "above"}
DEFINITIONS = {name for name, limit in CATALOGUE.limits.items() if limit.source.startswith("definition")}


@pytest.mark.parametrize(("check", "case"), WORKED, ids=[f"{c.key}: {k.gives}: {k.working[:40]}" for c, k in WORKED])
def test_worked_case_gives_what_its_hand_working_says(check: Check, case: Case) -> None:
    assert run_case(CATALOGUE, check, case).found == case.gives


@pytest.mark.parametrize("check", WITH_CASES, ids=[check.key for check in WITH_CASES])
def test_each_check_has_a_breach_a_pass_and_an_unproven_case(check: Check) -> None:
    assert {"breach", "meets", "unproven"} <= {case.gives for case in check.cases}


@pytest.mark.parametrize("check", WITH_CASES, ids=[check.key for check in WITH_CASES])
def test_some_case_notices_a_flipped_requirement(check: Check) -> None:
    for place, requirement in enumerate(check.requirements):
        if requirement.kind in CONTRARY:
            flipped = replace(requirement, kind=CONTRARY[requirement.kind])
        elif requirement.kind == "must_be":
            flipped = replace(requirement, text="off" if requirement.text == "on" else "on")
        else:
            continue
        others = check.requirements
        mutant = replace(check, requirements=(*others[:place], flipped, *others[place + 1 :]))
        noticed = any(run_case(CATALOGUE, mutant, case).found != case.gives for case in check.cases)
        assert noticed, f"no case of {check.key} notices that '{requirement.kind} {requirement.text}' was flipped"


def _checks_naming(catalogue: Catalogue) -> dict[str, list[Check]]:
    naming: dict[str, list[Check]] = defaultdict(list)
    for check in catalogue.checks:
        for name in catalogue.names_beneath(check):
            if name in catalogue.limits:
                naming[name].append(check)
    return naming


NAMING = _checks_naming(CATALOGUE)


@pytest.mark.parametrize("name", sorted(set(CATALOGUE.limits) - DEFINITIONS))
@pytest.mark.parametrize("factor", [0.99, 1.01])
def test_some_case_notices_a_limit_moved_by_one_per_cent(name: str, factor: float) -> None:
    limit = CATALOGUE.limits[name]
    # whole numbers of things are moved by one
    value = limit.value + (1 if factor > 1 else -1) if limit.says.startswith("number of") else limit.value * factor
    moved = replace(CATALOGUE, limits={**CATALOGUE.limits, name: replace(limit, value=value)})
    assert NAMING[name], f"no check uses the limit {name}"
    noticed = any(run_case(moved, check, case).found != case.gives for check in NAMING[name] for case in check.cases)
    counted = limit.unit.symbol == "an hour"
    assert noticed or counted, f"no case notices that {name} was moved by {factor}"


def test_every_limit_names_its_source() -> None:
    assert all(limit.source.strip() and limit.says.strip() for limit in CATALOGUE.limits.values())


def test_all_cases_hold_together() -> None:
    assert [result.check.key for result in run_cases(CATALOGUE) if not result.holds()] == []
