"""Defects that lie in more than one row: links, doubled rows, recorded starts, copied values."""

from __future__ import annotations

from datetime import date, datetime, timedelta

from tests.sites.curves import as_points
from tests.sites.plant import Site, Value, number, text
from tests.sites.tarnholt.planted.defect import shown

Row = dict[str, str]


def _row(key: str, check: str, severity: str, quantity: str, planted: Value, sound: Value, why: str) -> Row:
    return {
        "subject_key": key,
        "check": check,
        "severity": severity,
        "setting_or_datum": quantity,
        "planted_value": planted if isinstance(planted, str) else shown(planted),
        "sound_value": sound if isinstance(sound, str) else shown(sound),
        "why": why,
    }


def tag_twice(site: Site) -> list[Row]:
    """List a motor a second time under the same tag."""
    again = dict(site.motor("FD-304"))
    again["service"] = "Kiln feed weigh belt (spare)"
    site.motors.insert(site.motors.index(site.motor("FD-304")) + 1, again)
    why = "two rows carry this tag"
    return [
        _row(key, "register-tag-unique", "inconsistent", "motor", "FD-304", "one row", why)
        for key in ("FD-304", "FD-304 (2)")
    ]


def relay_without_settings(site: Site) -> list[Row]:
    """Lose the export of a relay."""
    relay = site.relay_of("SC-604")
    site.relays.remove(relay)
    tag = text(relay, "relay_tag")
    return [
        _row("SC-604", "register-relay-has-settings", "inconsistent", "relay", tag, tag, "no export holds this relay")
    ]


def settings_without_motor(site: Site) -> list[Row]:
    """Keep the export of a relay whose motor is gone from the list."""
    site.relays.append(
        {
            "relay_tag": "R-BC105",
            "layout": "mv_contactor",
            "relay_role": "motor",
            "relay_type": "MPR-3",
            "settings_export_date": date(2026, 9, 7),
            "relay_frequency_hz": 50.0,
            "relay_phase_rotation": "abc",
            "relay_ct_primary_a": 75.0,
            "relay_ct_secondary_a": 1.0,
            "relay_ct_count": 3.0,
        }
    )
    why = "no motor of the list names this relay"
    return [_row("R-BC105", "register-settings-have-motor", "inconsistent", "relay_tag", "R-BC105", "", why)]


def relay_named_twice(site: Site) -> list[Row]:
    """Let a motor name the relay of its neighbour; the export of its own is gone."""
    own = site.relay_of("P-701C")
    site.relays.remove(own)
    site.motor("P-701C")["relay"] = "R-P701B"
    why = "P-701B and P-701C name the same relay"
    return [
        _row(tag, check, severity, "relay", "R-P701B", sound, why)
        for tag, sound in (("P-701B", "R-P701B"), ("P-701C", "R-P701C"))
        for check, severity in (
            ("register-relay-serves-one-motor", "inconsistent"),
            ("parallel-motors-own-overload", "unsafe"),
        )
    ] + [
        _row(
            "P-701C",
            "restart-delay-outlasts-backspin",
            "unsafe",
            "restart_delay_s",
            50.0,
            80.0,
            "judged by the relay that it names: the pump can spin back for 60 s",
        )
    ]


def starts_too_often(site: Site) -> list[Row]:
    """Record three more starts within the hour after one that was recorded."""
    first = site.starts_of("P-115A")[10]
    moment = first["start_moment"]
    if not isinstance(moment, datetime):
        raise TypeError("a recorded start needs its moment")
    place = site.starts.index(first)
    for minutes in (48, 33, 17):
        again = dict(first) | {"start_moment": moment + timedelta(minutes=minutes)}
        site.starts.insert(place + 1, again)
    why = "four starts in 48 minutes; the data sheet permits three an hour"
    return [
        _row(
            "P-115A", "recorded-starts-within-data-sheet", "unsafe", "start_moment", "4 in an hour", "2 in an hour", why
        )
    ]


def starts_drift(site: Site) -> list[Row]:
    """Let the start times of a mill grow from year to year."""
    starts = site.starts_of("KM-202")
    first = starts[0]["start_moment"]
    sound = max(number(start, "start_time_s") for start in starts)
    for start in starts:
        moment = start["start_moment"]
        if not isinstance(moment, datetime) or not isinstance(first, datetime):
            raise TypeError("a recorded start needs its moment")
        years = (moment - first).total_seconds() / (365.25 * 86400)
        scatter = number(start, "start_time_s") / sound
        start["start_time_s"] = round((2.25 + 1.12 * years) * (0.8 + 0.2 * scatter), 2)
    last = number(starts[-1], "start_time_s")
    why = "one second longer from year to year; passes the timer within the next"
    return [_row("KM-202", "start-times-not-drifting", "observation", "start_time_s", last, sound, why)]


def start_current_misread(site: Site) -> list[Row]:
    """Record start currents far below what the list states."""
    rows = []
    for tag in ("F-660A", "F-660B"):
        starts = site.starts_of(tag)
        sound = max(number(start, "start_current_a") for start in starts)
        for start in starts:
            start["start_current_a"] = float(round(0.55 * number(start, "start_current_a")))
        worst = max(number(start, "start_current_a") for start in starts)
        why = "little more than half of the stated locked-rotor current"
        rows.append(
            _row(tag, "register-start-record-current-agrees", "inconsistent", "start_current_a", worst, sound, why)
        )
    return rows


def motor_replaced_since_export(site: Site) -> list[Row]:
    """Replace a motor after its relay was read."""
    motor = site.motor("C-410A")
    motor["motor_replaced_date"] = date(2026, 10, 5)
    motor["motor_data_date"] = date(2026, 10, 5)
    why = "the export of 2026-09-07 is older than the motor"
    return [
        _row("C-410A", "register-relay-file-current", "inconsistent", "motor_replaced_date", date(2026, 10, 5), "", why)
    ]


def ct_too_large(site: Site) -> list[Row]:
    """Fit a CT far above the motor's current; the relay is told so."""
    motor, relay = site.motor("CR-110"), site.relay_of("CR-110")
    sound = number(motor, "ct_primary_a")
    motor["ct_primary_a"] = relay["relay_ct_primary_a"] = 600.0
    return [_row("CR-110", "register-ct-primary-fits", "observation", "ct_primary_a", 600.0, sound, "4.3 x full load")]


def same_jam_pickup(site: Site) -> list[Row]:
    """Copy one jam pickup to motors of very different size."""
    tags = ("CR-102", "CR-103", "F-301")
    sound = "; ".join(shown(site.relay_of(tag)["jam_trip_pickup_a"]) for tag in tags)
    for tag in tags:
        site.relay_of(tag)["jam_trip_pickup_a"] = 160.0
    why = "full-load currents of 53 to 132 A share one figure"
    return [_row("; ".join(tags), "setting-not-copied-blindly", "inconsistent", "jam_trip_pickup_a", 160.0, sound, why)]


def limit_curve_dented(site: Site) -> list[Row]:
    """Supply a thermal limit that lies lower between twice and three times full load."""
    motor = site.motor("KM-202")
    sound = text(motor, "hot_limit_curve")
    full_load = number(motor, "full_load_a")
    points = [tuple(float(part.split()[0]) for part in point.split(": ")) for point in sound.split("; ")]
    lowered = [(current, time * (0.35 if 1.9 < current / full_load < 3.1 else 1.0)) for current, time in points]
    motor["hot_limit_curve"] = as_points(lowered)
    why = "between 2 and 3 x full load the relay trips from hot after the limit"
    return [_row("KM-202", "thermal-under-limit-curve", "unsafe", "hot_limit_curve", as_points(lowered), sound, why)]


def unit_left_out(site: Site) -> list[Row]:
    """Write a pickup as a bare number, without saying of what it is a multiple."""
    relay = site.relay_of("SC-602")
    relay["without_unit"] = "start_timer_pickup_a"
    multiple = number(relay, "start_timer_pickup_a") / number(relay, "relay_full_load_a")
    why = "neither a unit nor a base stands beside the number"
    return [
        _row("SC-602", "setting-base-stated", "inconsistent", "start_timer_pickup_a", f"{multiple:.1f}", "x FLA", why)
    ]


SEVERAL_ROWS = (
    tag_twice,
    relay_without_settings,
    settings_without_motor,
    relay_named_twice,
    starts_too_often,
    starts_drift,
    start_current_misread,
    motor_replaced_since_export,
    ct_too_large,
    same_jam_pickup,
    limit_curve_dented,
    unit_left_out,
)
