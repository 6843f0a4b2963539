"""Settings of the relays of invented sites, as a careful engineer chooses them."""
