"""From workbooks to readings: open, find headers, read cells, resolve."""
