"""Defects planted into the sound works, each with the findings that it must give."""
