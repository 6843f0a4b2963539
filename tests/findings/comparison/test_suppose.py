"""Suppositions: as if the workbook said so, with what is written as a multiple following; wrong ones refused."""

from __future__ import annotations

from collections.abc import Callable

import pytest

from audit.checks.catalogue import Catalogue
from audit.findings.comparison.suppose import read_supposition, suppose
from audit.fleet.fleet import Fleet
from audit.intake import gather, resolve
from audit.refusal import Refusal
from tests.findings.comparison.conftest import usual_files, write_site

Suppose = Callable[..., tuple[Fleet, list[str]]]


@pytest.fixture(scope="module")
def supposed(catalogue: Catalogue, tmp_path_factory: pytest.TempPathFactory) -> Suppose:
    """Read a small site and suppose something of it."""
    gathered = gather(write_site(tmp_path_factory.mktemp("supposed") / "site", usual_files()))
    fleet = resolve(gathered)

    def run(*texts: str) -> tuple[Fleet, list[str]]:
        changed, told = suppose(gathered, fleet, [read_supposition(text) for text in texts], catalogue.quantities)
        return resolve(changed), [f"{one.name} {one.quantity} {one.was} -> {one.supposed}" for one in told]

    return run


def value(fleet: Fleet, subject: str, name: str, quantity: str) -> object:
    table = fleet.tables[subject]
    return table.columns[quantity].values[table.keys.index(name)]


def test_a_supposed_datum_takes_the_place_of_the_one_read(supposed: Suppose) -> None:
    fleet, told = supposed("bus=B-1:fault_max_ka=31.5", "motor=p-2:locked_rotor_a=930")
    assert value(fleet, "bus", "B-1", "fault_max_ka") == 31.5
    assert value(fleet, "bus", "B-2", "fault_max_ka") == 21
    assert value(fleet, "motor", "P-2", "locked_rotor_a") == 930
    assert told == ["B-1 fault_max_ka 20 kA -> 31.5 kA", "P-2 locked_rotor_a 492 A -> 930 A"]


def test_what_is_written_as_a_multiple_follows_a_supposed_base(supposed: Suppose) -> None:
    # R-1 is set to 5.1 x CT: 5.1 x 150 A = 765 A; with a CT setting of 200 A 1020 A
    assert value(supposed()[0], "relay", "R-1", "short_circuit_trip_pickup_a") == pytest.approx(765)
    fleet, _ = supposed("relay=R-1:relay_ct_primary_a=200")
    assert value(fleet, "relay", "R-1", "short_circuit_trip_pickup_a") == pytest.approx(1020)
    assert value(fleet, "relay", "R-2", "short_circuit_trip_pickup_a") == pytest.approx(5.2 * 150)


def test_a_setting_may_be_supposed_of_the_motor(supposed: Suppose) -> None:
    fleet, _ = supposed("motor=P-3:short_circuit_trip_pickup_a=900")
    assert value(fleet, "relay", "R-3", "short_circuit_trip_pickup_a") == 900


def test_a_datum_that_was_not_given_may_be_supposed(supposed: Suppose) -> None:
    fleet, told = supposed(
        "motor=P-1:safe_stall_hot_s=12", "motor=P-1:starting_method=soft starter", "bus=B-1:earthing=solid"
    )
    assert value(fleet, "motor", "P-1", "safe_stall_hot_s") == 12
    method = fleet.tables["motor"].columns["starting_method"]
    assert method.choices[int(method.values[0])] == "soft_starter"
    assert told[0] == "P-1 safe_stall_hot_s not known -> 12 s"


@pytest.mark.parametrize(
    ("text", "said"),
    [
        ("bus=B-1", "cannot be read"),
        ("buss=B-1:fault_max_ka=20", "nearest known name is 'bus'"),
        ("bus=B-3:fault_max_ka=20", "nearest known name is 'B-"),
        ("bus=B-1:fault_mx_ka=20", "nearest known name is 'fault_max_ka'"),
        ("motor=P-1:fault_max_ka=20", "Write bus=NAME:fault_max_ka=20"),
        ("bus=B-1:fault_max_ka=abc", "is not a number"),
        ("bus=B-1:fault_max_ka=nan", "is not a number"),
        ("bus=B-1:fault_max_ka=9999999", "outside the plausible range"),
        ("motor=P-1:starting_method=softly", "is none of direct_on_line"),
        ("motor=P-1:must_run=perhaps", "neither yes nor no"),
        ("motor=P-1:ct_changed_date=30.2.2026", "write it as"),
        ("motor=P-1:upper_start_current_a=900", "is worked out"),
        ("motor=P-1:motor=P-2", "cannot be supposed"),
    ],
)
def test_a_wrong_supposition_is_refused_with_what_is_accepted(supposed: Suppose, text: str, said: str) -> None:
    with pytest.raises(Refusal, match=said.replace("(", r"\(")):
        supposed(text)
