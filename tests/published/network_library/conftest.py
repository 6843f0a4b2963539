"""The script beside this file needs a library that the suite does not install."""

collect_ignore = ["make_results.py"]
