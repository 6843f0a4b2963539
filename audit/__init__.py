"""Audit of the motor-protection settings of a whole site."""
