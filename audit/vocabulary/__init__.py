"""The one list of quantities, their units, and the words that sites use for them."""
