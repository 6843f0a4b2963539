"""Layouts of tables: one row a record, one row a setting, one block a relay."""
