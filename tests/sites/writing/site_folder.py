"""All workbooks of a site in one folder."""

from __future__ import annotations

from pathlib import Path

from tests.sites.plant import Site
from tests.sites.writing.lists import high_voltage_tags, write_bus_list, write_start_text, write_start_workbook
from tests.sites.writing.long_settings import write_long_settings
from tests.sites.writing.motor_list import write_motor_list
from tests.sites.writing.wide_settings import write_wide_settings


def write_site(site: Site, folder: Path, unread: tuple[str, ...] = ()) -> None:
    """Write motor list, settings, start records and bus list of a site into a folder, and what the site says of them.

    `unread` names tables in the folder that are none of the site's own and shall be left unread.
    """
    folder.mkdir(parents=True, exist_ok=True)
    write_motor_list(site, folder / "motor_list.xlsx")
    write_wide_settings(site, folder / "relay_settings_switchgear.xlsx")
    write_long_settings(site, folder / "relay_settings_lv_mcc.xlsx")
    high = high_voltage_tags(site)
    above = [start for start in site.starts if start["start_motor"] in high]
    below = [start for start in site.starts if start["start_motor"] not in high]
    if above:
        write_start_text(above, folder / "start_records_mv.csv")
    if below:
        write_start_workbook(below, folder / "start_records_lv.xlsx")
    write_bus_list(site, folder / "bus_list.xlsx")
    lines = [f'site = "{site.name}"', 'code = "IEC"']
    for name in unread:
        lines += ["", "[[sheet]]", f'file = "{name}"', 'table = "none"']
    (folder / "fleet.toml").write_text("\n".join(lines) + "\n", "utf-8")
