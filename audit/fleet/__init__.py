"""The fleet: columns with values, bases and cells; tables per subject; links between them."""
