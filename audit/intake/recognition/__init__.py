"""From grids of cells to readings: header words, units, bases, tables, second signs and combined cells."""
