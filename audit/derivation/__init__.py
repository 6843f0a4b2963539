"""Derived quantities: recipes in rules/derived, evaluated on demand, each row with the basis beneath it."""
