"""Which table a sheet holds, told by whose headers fit best."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

from audit.intake.recognition.dictionary import combined_readings
from audit.intake.recognition.header_rows import Heading
from audit.intake.recognition.matching import HeaderMatch
from audit.vocabulary.quantities import vocabulary

_WHO_AND_WHERE = frozenset(
    {"motor", "service", "area", "bus", "cubicle", "relay", "winding", "motor_type", "motor_make"}
)
_WHO_SETS = frozenset({"relay_tag", "motor", "service", "area", "bus", "setting_group"})
_OF_A_FAULT = frozenset({"fault_max_ka", "fault_min_ka", "fault_x_r_ratio", "earthing"})
FEWEST_MOTOR_FACTS = 2


@dataclass(frozen=True)
class Verdict:
    """The table that a heading fits, how well, and how its columns match there."""

    table: str
    score: float
    matches: Mapping[int, HeaderMatch]


def names_in(matches: Mapping[int, HeaderMatch]) -> set[str]:
    """Give the quantities that some columns hold."""
    names: set[str] = set()
    for found in matches.values():
        if found.quantity:
            names.add(found.quantity)
        elif found.combined:
            names.update(combined_readings()[found.combined].quantities)
        elif found.open_part:
            names.add(f"{found.element}_{found.open_part}")
    return names


def table_of(heading: Heading, settings_make_list: bool = False) -> Verdict | None:
    """Decide which table a heading belongs to; None where no table has headers like these.

    `settings_make_list` lets a sheet of settings by motor tag serve as the motor list, for sites without another.
    """
    matches = {table: heading.matches(table) for table in ("motor", "relay", "bus", "start")}
    verdicts = [
        verdict
        for verdict in (
            _motor(matches, settings_make_list),
            _start(matches["start"]),
            _relay(matches),
        )
        if verdict is not None
    ]
    if not any(verdict.table == "motor" for verdict in verdicts):
        bus = _bus(matches["bus"])
        verdicts += [bus] if bus else []
    if not verdicts:
        return None
    motor = next((verdict for verdict in verdicts if verdict.table == "motor"), None)
    best = max(verdicts, key=lambda verdict: verdict.score)
    # settings beside the facts of a motor belong to the motor list
    return motor if best.table == "relay" and motor is not None else best


def _key_place(matches: Mapping[int, HeaderMatch], quantity: str) -> int:
    return next(
        (column for column, found in matches.items() if found.quantity == quantity or quantity in found.candidates), 0
    )


def _motor(matches: Mapping[str, Mapping[int, HeaderMatch]], settings_make_list: bool) -> Verdict | None:
    known = vocabulary().quantities
    motor, relay = matches["motor"], matches["relay"]
    tag = _key_place(motor, "motor")
    if not tag:
        return None
    names = names_in(motor)
    facts = {name for name in names if name in known and known[name].subject == "motor"} - _WHO_AND_WHERE
    who = names & _WHO_AND_WHERE
    settings = {name for name in names if name not in known or known[name].subject == "relay"}
    verdict = Verdict("motor", len(facts) + len(who) + len(settings), motor)
    if settings_make_list and ("motor" in names or len(facts) + len(settings) >= 3) and (settings or facts):
        return verdict
    # what a relay is told, too, says nothing about whose list this is
    own = names_in({column: found for column, found in motor.items() if not relay.get(column, found).known})
    own -= {"motor"}
    own_facts = {name for name in own if name in known and known[name].subject == "motor"} - _WHO_AND_WHERE
    relay_column = _key_place(relay, "relay_tag")
    of_relays = bool(settings) or (relay_column and relay_column < tag)
    if of_relays:
        return verdict if len(own_facts) >= FEWEST_MOTOR_FACTS else None
    if len(facts) >= FEWEST_MOTOR_FACTS:
        return verdict
    # little is known of these rows: they must at least be headed as motors
    return verdict if "motor" in names and facts and len(facts) + len(who) >= 3 else None


def _start(matches: Mapping[int, HeaderMatch]) -> Verdict | None:
    names = names_in(matches)
    starts = names - {"start_motor", "start_clock"}
    if (
        "start_motor" not in names
        or len(starts) < 2
        or not starts
        & {
            "start_moment",
            "start_current_a",
            "start_time_s",
        }
    ):
        return None
    # a motor list knows starting currents and times too; a record of a start has a date
    return Verdict("start", len(starts) + (3 if "start_moment" in starts else 0), matches)


def _relay(matches: Mapping[str, Mapping[int, HeaderMatch]]) -> Verdict | None:
    names = names_in(matches["relay"])
    told = names - _WHO_SETS
    if not told or not (names & {"relay_tag"} or _key_place(matches["motor"], "motor")):
        return None
    return Verdict("relay", len(told) + len(names & {"relay_tag"}), matches["relay"])


def _bus(matches: Mapping[int, HeaderMatch]) -> Verdict | None:
    names = names_in(matches)
    told = names - {"bus_name"}
    if "bus_name" not in names or not told:
        return None
    return Verdict("bus", len(told) + (1 if told & _OF_A_FAULT else 0), matches)
