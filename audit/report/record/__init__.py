"""The record of an audit: findings.json, findings.csv and the readings."""
