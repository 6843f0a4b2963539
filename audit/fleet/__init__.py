"""Tables of motors, relays, buses, starts and groups; columns whose values carry basis and cell."""
