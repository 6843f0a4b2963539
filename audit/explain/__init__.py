"""The calculation sheet of a motor: every figure walked back to a cell, a formula or an assumption."""
