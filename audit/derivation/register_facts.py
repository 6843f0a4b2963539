"""Facts about the register itself: which relay, bus and settings were found, what stands twice, how it is written.

They come from the links and readings of a fleet, not from a recipe; expressions use them like any quantity.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping

import numpy as np
from numpy.typing import NDArray

from audit.derivation.written_facts import WRITTEN_FACTS, written_facts
from audit.fleet.column import NO, NO_CELL, STATED, UNKNOWN, YES, Bytes, Column, Floats, Integers
from audit.fleet.fleet import Fleet, Table
from audit.fleet.folding import exact, loose
from audit.vocabulary.quantities import Quantity, vocabulary
from audit.vocabulary.units import DIMENSIONLESS

Mask = NDArray[np.bool_]
LEAST_SETTINGS_COMPARED = 5
"""Fewer settings than these say nothing about a block of settings being a copy of another."""
DATES_OF_CHANGE: Mapping[str, tuple[str, str]] = {
    "motor_change_stated": ("motor", "motor_replaced_date"),
    "ct_change_stated": ("motor", "ct_changed_date"),
    "supply_change_stated": ("bus", "supply_changed_date"),
}
"""Facts that say whether a date of change is given; none given means no change stated."""
NFPA_70 = "NFPA 70"
"""What a site that is under the US code states as its code."""
_TELL_WINDINGS_APART = ("winding", "rated_speed_rpm", "poles", "starting_method")


def _truth(name: str, subject: str, label: str, ask: str = "") -> Quantity:
    return Quantity(name=name, label=label, subject=subject, kind="truth", role="derived", ask=ask or None)


def _count(name: str, subject: str, label: str) -> Quantity:
    return Quantity(name=name, label=label, subject=subject, kind="number", role="derived", unit=DIMENSIONLESS)


REGISTER_FACTS: dict[str, Quantity] = {
    fact.name: fact
    for fact in (
        _count("rows_with_this_tag", "motor", "rows of the motor list with this tag"),
        _truth("relay_named", "motor", "a relay is named"),
        _truth("settings_found", "motor", "settings of the named relay are found"),
        _truth("settings_expected", "motor", "settings of the motor are given or a relay is named"),
        _count("other_motors_on_relay", "motor", "other motors that name the same relay"),
        _truth("site_code_is_nfpa_70", "motor", "the site states NFPA 70 as its code"),
        _truth("bus_named", "motor", "a bus is named"),
        _truth("bus_found", "motor", "the named bus is in the bus list", "a bus list with a row for each bus"),
        _truth("motor_change_stated", "motor", "a replacement or rewind of the motor is stated"),
        _truth("ct_change_stated", "motor", "a change of the CTs is stated"),
        _truth("supply_change_stated", "bus", "a change of the supply is stated"),
        _truth("motor_found", "relay", "a motor of the list names the relay"),
        _truth("several_setting_groups", "relay", "the relay has more than one setting group"),
        _truth(
            "other_groups_settled",
            "relay",
            "of every other setting group it is known whether it can be selected",
            "whether an input, communication or logic can select each other setting group",
        ),
        _truth("same_settings_as_spare", "relay", "the settings are those of a spare relay of the same type"),
        *WRITTEN_FACTS.values(),
    )
}


def with_register_facts(fleet: Fleet) -> Fleet:
    """Give the fleet with the facts of its register as columns of motors, relays and buses."""
    columns: dict[str, dict[str, Column]] = {subject: {} for subject in ("motor", "relay", "bus")}
    for name, column in _facts(fleet):
        columns[REGISTER_FACTS[name].subject][name] = column
    for subject, found in columns.items():
        if subject in fleet.tables:
            fleet = fleet.with_columns(subject, found)
    return fleet


def _facts(fleet: Fleet) -> Iterator[tuple[str, Column]]:
    for of in (_motor_facts, _code_facts, _relay_facts, _change_facts, written_facts):
        yield from of(fleet)


def _table(fleet: Fleet, subject: str) -> Table:
    return fleet.tables.get(subject) or Table(subject, (), {})


def _of(table: Table, name: str) -> Column:
    quantity = vocabulary().quantities[name]
    return table.columns.get(name) or Column.empty(quantity.kind, len(table), quantity.choices)


def _column(kind: str, values: NDArray[np.generic], cell: Integers) -> Column:
    basis = np.full(len(values), STATED, dtype=np.int8)
    return Column("number" if kind == "number" else "truth", values, basis, cell)


def _codes(texts: list[str]) -> Integers:
    return np.unique(np.array(texts, dtype=str), return_inverse=True)[1].reshape(-1)


def _alike(codes: Integers) -> Floats:
    return np.bincount(codes)[codes].astype(float) if len(codes) else np.zeros(0)


def _texts(column: Column, fold: bool = False) -> list[str]:
    return [(loose(text) if fold else exact(text)) if text is not None else "" for text in column.values]


def _labels(column: Column) -> list[str]:
    if column.kind == "text":
        return _texts(column)
    return ["" if gone else f"{value:g}" for value, gone in zip(column.values, column.missing(), strict=True)]


def _joined(labels: list[list[str]]) -> list[str]:
    return ["\t".join(parts) for parts in zip(*labels, strict=True)]


def _link(fleet: Fleet, child: str, parent: str) -> Integers:
    link = fleet.links.get((child, parent))
    return link if link is not None else np.full(fleet.rows(child), -1, dtype=np.int64)


def _found(linked: Mask, names: list[str], spelled: list[str]) -> Bytes:
    """Found where linked; open where a name of the other table differs in dashes and spaces only; else not found."""
    known = set(spelled)
    open_ = np.array([name in known for name in names], dtype=bool)
    return np.where(linked, YES, np.where(open_, UNKNOWN, NO)).astype(np.int8)


def _motor_facts(fleet: Fleet) -> Iterator[tuple[str, Column]]:
    motors, relays, buses = (_table(fleet, subject) for subject in ("motor", "relay", "bus"))
    tag, relay, bus = (_of(motors, name) for name in ("motor", "relay", "bus"))
    windings = [_labels(_of(motors, name)) for name in _TELL_WINDINGS_APART]
    alike = np.where(tag.missing(), np.nan, _alike(_codes(_joined([_texts(tag), *windings]))))
    yield "rows_with_this_tag", _column("number", alike, tag.cell)

    named = ~relay.missing()
    yield "relay_named", _column("truth", np.where(named, YES, NO).astype(np.int8), relay.cell)
    linked = _link(fleet, "motor", "relay")
    names = _texts(relay, fold=True)
    found = _found(linked >= 0, names, [loose(key) for key in relays.keys])
    told = np.append(_settings_told(fleet), np.int8(NO))
    settings = np.where(linked >= 0, told[linked], found)
    yield "settings_found", _column("truth", np.where(named, settings, NO).astype(np.int8), relay.cell)
    expected = np.where((linked >= 0) | named, YES, NO).astype(np.int8)
    yield "settings_expected", _column("truth", expected, relay.cell)
    others = np.where((linked < 0) & (found == UNKNOWN), np.nan, _others_on_relay(motors, linked, names))
    yield "other_motors_on_relay", _column("number", others, relay.cell)

    bus_named = ~bus.missing()
    yield "bus_named", _column("truth", np.where(bus_named, YES, NO).astype(np.int8), bus.cell)
    listed = ~_of(buses, "bus_name").missing()
    bus_row = _link(fleet, "motor", "bus")
    in_list = (bus_row >= 0) & np.append(listed, False)[bus_row]
    found = _found(in_list, _texts(bus, fold=True), [loose(buses.keys[row]) for row in np.flatnonzero(listed)])
    if not listed.any():
        found = np.full(len(motors), UNKNOWN, dtype=np.int8)
    yield "bus_found", _column("truth", found, bus.cell)


def _code_facts(fleet: Fleet) -> Iterator[tuple[str, Column]]:
    size = len(_table(fleet, "motor"))
    code = fleet.facts.get("code", "")
    stated = UNKNOWN if not code else YES if code == NFPA_70 else NO
    yield "site_code_is_nfpa_70", _column("truth", np.full(size, stated, dtype=np.int8), np.full(size, NO_CELL))


def _settings_told(fleet: Fleet) -> Bytes:
    """For each relay row: yes where a setting is known, unknown where there are only unusable ones, else no."""
    relays = _table(fleet, "relay")
    settings = vocabulary().settings()
    told = np.zeros(len(relays), dtype=bool)
    touched = np.zeros(len(relays), dtype=bool)
    for name, quantity in settings.items():
        column = relays.columns.get(name)
        if column is not None:
            told |= (column.cell != NO_CELL) & ~column.missing() if quantity.absent_means_no else ~column.missing()
            touched |= column.cell != NO_CELL
    return np.where(told, YES, np.where(touched, UNKNOWN, NO)).astype(np.int8)


def _others_on_relay(motors: Table, linked: Integers, names: list[str]) -> Floats:
    """Count the other tags that share a relay; a stated duty or standby partner does not count."""
    named = np.array([name != "" for name in names], dtype=bool)
    if not named.any():
        return np.full(len(motors), np.nan)
    relay = _codes([f"row {row}" if row >= 0 else f"name {name}" for row, name in zip(linked, names, strict=True)])
    own, partner = _texts(_of(motors, "motor"), fold=True), _texts(_of(motors, "duty_standby_with"), fold=True)
    own = [text or loose(key) for text, key in zip(own, motors.keys, strict=True)]
    codes = _codes([*own, *partner])
    tag, partner_tag = codes[: len(own)], codes[len(own) :]
    many = len(codes) + 1
    pair, wanted = relay * many + tag, relay * many + partner_tag
    distinct = np.unique(pair[named])
    on_relay = np.bincount(distinct // many, minlength=int(relay.max()) + 1)[relay].astype(float)
    stated = named & np.array([name != "" for name in partner], dtype=bool)
    mine = stated & np.isin(wanted, distinct) & (wanted != pair)
    by_others = named & ~mine & np.isin(pair, wanted[stated & (wanted != pair)])
    return np.where(named, on_relay - 1 - mine - by_others, np.nan)


def _relay_facts(fleet: Fleet) -> Iterator[tuple[str, Column]]:
    relays, motors = _table(fleet, "relay"), _table(fleet, "motor")
    tag = _of(relays, "relay_tag")
    serves = _link(fleet, "relay", "motor") >= 0
    spelled = [*_texts(_of(motors, "relay"), fold=True), *(loose(key) for key in motors.keys)]
    yield "motor_found", _column("truth", _found(serves, _texts(tag, fold=True), spelled), tag.cell)

    device = _codes([text or exact(key) for text, key in zip(_texts(tag), relays.keys, strict=True)])
    group = _of(relays, "setting_group")
    several = _alike(device) > 1
    yield "several_setting_groups", _column("truth", np.where(several, YES, NO).astype(np.int8), group.cell)
    selectable = _of(relays, "group_selectable")
    open_ = ((selectable.values == UNKNOWN) & ~group.missing()).astype(float)
    left_open = np.bincount(device, weights=open_)[device] - open_ if len(device) else open_
    settled = np.where(left_open > 0, UNKNOWN, YES).astype(np.int8)
    yield "other_groups_settled", _column("truth", settled, selectable.cell)
    yield "same_settings_as_spare", _column("truth", _copies_of_spares(relays, serves), tag.cell)


def _copies_of_spares(relays: Table, serves: Mask) -> Bytes:
    role = _of(relays, "relay_role")
    spare = (role.values == role.choices.index("spare")) | (role.missing() & ~serves)
    compared = [q for q in vocabulary().settings().values() if q.kind != "text" and not q.absent_means_no]
    settings = [_of(relays, quantity.name) for quantity in compared]
    known = np.sum([~column.missing() for column in settings], axis=0)
    enough = known >= LEAST_SETTINGS_COMPARED
    kind = _texts(_of(relays, "relay_type"))
    comparable = enough & np.array([text != "" for text in kind], dtype=bool)
    copies = np.full(len(relays), UNKNOWN, dtype=np.int8)
    copies[comparable] = NO
    if (spare & comparable).any():
        figures = [np.nan_to_num(column.values.astype(float), nan=-1.0) for column in settings]
        blocks = np.column_stack([_codes(kind).astype(float), *figures])[comparable]
        block = np.unique(blocks, axis=0, return_inverse=True)[1].reshape(-1)
        of_spare = np.isin(block, block[spare[comparable]])
        copies[comparable] = np.where(of_spare, YES, NO)
    return copies


def _change_facts(fleet: Fleet) -> Iterator[tuple[str, Column]]:
    for name, (subject, date) in DATES_OF_CHANGE.items():
        column = _of(_table(fleet, subject), date)
        unread = column.missing() & (column.cell != NO_CELL)
        stated = np.where(unread, UNKNOWN, np.where(column.missing(), NO, YES)).astype(np.int8)
        yield name, _column("truth", stated, column.cell)
