"""A works in which things stand that a disturbed copy does not bring about: each planted by hand, one a motor."""

from __future__ import annotations

from datetime import date, datetime, timedelta
from pathlib import Path

from tests.sites.plant import Site, number
from tests.sites.tarnholt.sound import sound_site
from tests.sites.writing.site_folder import write_site


def situations_site() -> Site:
    """Give the sound works with what stands in each function below."""
    site = sound_site()
    for change in (
        _reversed_after_the_rotation_check,
        _a_bus_without_motors,
        _too_much_current_through_the_core,
        _a_contactor_that_opens_an_earth_fault_at_once,
        _many_starts_in_an_hour,
        _differential_stages,
        _names_spelled_otherwise,
        _a_slip_ring_motor,
        _a_bare_delay,
        _a_voltage_level_without_full_load_currents,
        _an_efficiency_class_not_known,
        _settings_that_were_not_exported,
        _data_that_nobody_has,
        _earth_faults_on_solidly_earthed_boards,
        _a_soft_start_that_may_be_bypassed,
    ):
        change(site)
    return site


def write_situations(folder: Path) -> None:
    """Write the workbooks."""
    site = situations_site()
    write_site(site, folder)
    # a second list: design letters, one of them of a motor whose efficiency class is not known
    lines = ["Tag No.,Service,NEMA Design", *(f"{motor['motor']},{motor['service']},B" for motor in site.motors[-40:])]
    (folder / "further_list.csv").write_text("\n".join(lines) + "\n", "utf-8")


def _reversed_after_the_rotation_check(site: Site) -> None:
    for tag in ("P-110A", "P-110B"):
        site.motor(tag)["supply_reterminated_date"] = date(2026, 3, 2)
    site.relay_of("P-110A")["phase_sequence_trip_on"] = False
    for setting in ("trip_on", "trip_pickup_pct", "trip_delay_s"):
        site.relay_of("P-110B").pop(f"phase_sequence_{setting}")


def _a_bus_without_motors(site: Site) -> None:
    site.buses.append({**site.bus("MCC-44"), "bus_name": "MCC-49"})


def _too_much_current_through_the_core(site: Site) -> None:
    site.buses.append({**site.bus("MCC-3B"), "bus_name": "MCC-3C"})
    for datum in ("earth_fault_max_a", "earth_fault_min_a", "neutral_resistor_ohm"):
        site.bus("MCC-3C").pop(datum, None)
    site.bus("MCC-3B")["earth_fault_max_a"] = 14.0


def _a_contactor_that_opens_an_earth_fault_at_once(site: Site) -> None:
    # on a solidly earthed board, where the element waits for no fuse
    fitted = {"earth_ct_kind": "core_balance", "earth_ct_primary_a": 50.0, "earth_ct_secondary_a": 1.0}
    site.motor("BC-202").update(fitted)
    site.relay_of("BC-202").update(
        relay_earth_source="core_balance",
        relay_earth_ct_primary_a=50.0,
        relay_earth_ct_secondary_a=1.0,
        earth_fault_trip_on=True,
        earth_fault_trip_pickup_a=12.0,
        earth_fault_trip_delay_s=0.0,
        earth_fault_opens="contactor",
    )


def _many_starts_in_an_hour(site: Site) -> None:
    last = site.starts_of("F-660B")[-1]
    moment = last["start_moment"]
    assert isinstance(moment, datetime)
    site.starts += [
        {**last, "start_moment": moment + timedelta(minutes=step), "start_time_s": 1.2} for step in range(2, 40, 2)
    ]


def _differential_stages(site: Site) -> None:
    relay = site.relay_of("KM-201")
    relay["differential_start_pickup_a"] = 0.5 * number(relay, "differential_run_pickup_a")
    site.relay_of("KM-202").pop("differential_run_pickup_a")


def _names_spelled_otherwise(site: Site) -> None:
    # a relay 'R_BC203' of the list may be 'R-BC203' or 'R BC203' of the export; the boards likewise
    for named in (site.relay_of("BC-203"), site.relay_of("BC-204")):
        tag = str(named["relay_tag"])
        twin = {**named, "relay_tag": tag.replace("-", " ")}
        site.relays.append(twin)
        site.motor(str(named["motor"]))["relay"] = tag.replace("-", "_")
    site.buses.append({**site.bus("MCC-43"), "bus_name": "MCC 43"})
    site.motor("BC-203")["bus"] = "MCC_43"


def _a_slip_ring_motor(site: Site) -> None:
    site.motor("CR-102")["motor_kind"] = "wound_rotor"


def _a_bare_delay(site: Site) -> None:
    # 8 s without a unit for an earth-fault element
    site.relay_of("BC-206").update(
        earth_fault_trip_on=True, earth_fault_trip_delay_s=8.0, without_unit="earth_fault_trip_delay_s"
    )


def _a_voltage_level_without_full_load_currents(site: Site) -> None:
    for motor in site.motors:
        if number(motor, "rated_voltage_v") > 5000:
            motor.pop("full_load_a")


def _an_efficiency_class_not_known(site: Site) -> None:
    site.motor("P-170A").pop("efficiency_class")


def _settings_that_were_not_exported(site: Site) -> None:
    site.relay_of("BC-401").pop("thermal_trip_class")
    site.relay_of("P-115A").pop("short_circuit_trip_delay_s")
    # so low that only a long delay would let the start through, and the delay is not known
    site.relay_of("KM-202")["differential_start_pickup_a"] = 2.0
    site.relay_of("KM-202").pop("differential_start_delay_s")
    site.relay_of("KM-202").pop("differential_run_delay_s")


def _data_that_nobody_has(site: Site) -> None:
    for tag, datum in (
        ("F-630", "speed_switch_delay_s"),
        ("KM-201", "hot_limit_curve"),
        ("KM-202", "stator_leads"),
        ("F-370", "te_s"),
        ("P-710A", "locked_rotor_a"),
    ):
        site.motor(tag).pop(datum)
    # two CTs, and the relay does not say how many it takes to be there
    site.motor("P-160A")["ct_count"] = 2.0
    site.relay_of("P-160A").pop("relay_ct_count")


def _earth_faults_on_solidly_earthed_boards(site: Site) -> None:
    site.relay_of("P-140A")["earth_fault_trip_on"] = False
    site.relay_of("P-140B")["earth_fault_trip_on"] = False
    site.motor("P-140B").pop("switching_device")
    site.relay_of("P-160B")["earth_fault_trip_pickup_a"] = 60.0
    # the residual of a start needs a delay or a core-balance CT
    site.relay_of("P-130A")["earth_fault_trip_delay_s"] = 0.0


def _a_soft_start_that_may_be_bypassed(site: Site) -> None:
    # carried to the full current, the start is longer than the thermal element lets it be
    site.motor("P-190A").update(bypass_start_possible=True, stated_start_time_s=30.0)
