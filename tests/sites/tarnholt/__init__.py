"""Tarnholt Quarry and Lime Works: an invented site."""
