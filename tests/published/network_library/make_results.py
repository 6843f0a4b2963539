"""Makes results.csv: short-circuit currents by a network calculation library, to hold our formulas against.

The suite does not run this. To make the file anew: a virtual environment of its own with pandapower 3.5,
then `python make_results.py > results.csv`. Radial networks only; every quantity is named as in the test beside it.
"""

from __future__ import annotations

import csv
import math
import sys

import pandapower as pp
import pandapower.shortcircuit as sc

SOURCE = f"pandapower {pp.__version__}, short-circuit calculation after IEC 60909, radial network"
COLUMNS = ["quantity", "inputs", "expected", "tolerance", "source", "known"]
VOLTAGE_KV = 6.0
FAULT_LEVEL_MVA = 250.0


def network(x_to_r_ratio: float, fault_level_mva: float = FAULT_LEVEL_MVA, voltage_kv: float = VOLTAGE_KV):
    """Build one bus on a supply of given strength and angle."""
    net = pp.create_empty_network(f_hz=50)
    bus = pp.create_bus(net, vn_kv=voltage_kv)
    pp.create_ext_grid(
        net,
        bus,
        s_sc_max_mva=fault_level_mva,
        s_sc_min_mva=fault_level_mva,
        rx_max=1 / x_to_r_ratio,
        rx_min=1 / x_to_r_ratio,
    )
    return net, bus


def peak_factor(x_to_r_ratio: float) -> float:
    """Give the peak factor kappa from the peak current of a fault at the bus."""
    net, bus = network(x_to_r_ratio)
    sc.calc_sc(net, fault="3ph", case="max", ip=True, topology="radial")
    result = net.res_bus_sc.loc[bus]
    return result.ip_ka / (math.sqrt(2) * result.ikss_ka)


def motor_contribution_ka(
    rated_power_kw: float, voltage_kv: float, power_factor: float, efficiency_pct: float, multiple: float
) -> float:
    """Give what a motor adds to a fault at its bus, the supply at the motor's own angle so that moduli add up."""
    motor_r_to_x = 0.1
    totals = []
    for with_motor in (False, True):
        net, bus = network(1 / motor_r_to_x, voltage_kv=voltage_kv)
        if with_motor:
            pp.create_motor(
                net,
                bus,
                pn_mech_mw=rated_power_kw / 1000,
                cos_phi=power_factor,
                cos_phi_n=power_factor,
                efficiency_percent=efficiency_pct,
                efficiency_n_percent=efficiency_pct,
                vn_kv=voltage_kv,
                rx=motor_r_to_x,
                lrc_pu=multiple,
            )
        sc.calc_sc(net, fault="3ph", case="max", topology="radial")
        totals.append(net.res_bus_sc.ikss_ka.at[bus])
    return totals[1] - totals[0]


def fault_at_cable_end_ka(
    fault: str, case: str, x_to_r_ratio: float, length_km: float, r_ohm_per_km: float, x_ohm_per_km: float
) -> float:
    """Give the fault current at the end of a cable; the least one with conductors at 80 C."""
    net, bus = network(x_to_r_ratio)
    end = pp.create_bus(net, vn_kv=VOLTAGE_KV)
    pp.create_line_from_parameters(
        net,
        bus,
        end,
        length_km=length_km,
        r_ohm_per_km=r_ohm_per_km,
        x_ohm_per_km=x_ohm_per_km,
        c_nf_per_km=0,
        max_i_ka=1,
        endtemp_degree=80,
    )
    sc.calc_sc(net, fault=fault, case=case, topology="radial")
    return net.res_bus_sc.ikss_ka.at[end]


def main() -> None:
    """Write all rows to standard output."""
    rows = []
    for x_to_r in (3, 5, 6.6, 10, 15, 20, 25, 50):
        rows.append(("peak factor kappa", f"x_to_r_ratio={x_to_r}", peak_factor(x_to_r)))
    for power, kv, pf, eff, multiple in (
        (1000, 6, 0.86, 95, 5.5),
        (250, 6, 0.87, 94, 6),
        (2500, 11, 0.89, 96.5, 5),
    ):
        inputs = (
            f"rated_power_kw={power}; rated_voltage_v={kv * 1000}; power_factor={pf}; efficiency_pct={eff}; "
            f"locked_rotor_multiple={multiple}; voltage_factor_pu=1.1"
        )
        rows.append(("motor contribution (kA)", inputs, motor_contribution_ka(power, kv, pf, eff, multiple)))
    for x_to_r, km, r, x in ((10, 0.4, 0.193, 0.09), (3, 1.5, 0.387, 0.1), (30, 0.1, 0.0754, 0.08)):
        inputs = f"x_to_r_ratio={x_to_r}; length_km={km}; r_ohm_per_km={r}; x_ohm_per_km={x}"
        greatest = fault_at_cable_end_ka("3ph", "max", x_to_r, km, r, x)
        least = fault_at_cable_end_ka("2ph", "min", x_to_r, km, r, x)
        rows.append(("three-phase fault at the end of a cold cable (kA)", inputs, greatest))
        rows.append(("phase-to-phase fault at the end of a hot cable (kA)", inputs, least))
    writer = csv.writer(sys.stdout, lineterminator="\n")
    writer.writerow(COLUMNS)
    for quantity, inputs, value in rows:
        writer.writerow([quantity, inputs, f"{value:.8g}", "rel 1e-6", SOURCE, "derived"])


if __name__ == "__main__":
    main()
