"""Workbooks of an invented site, written as people keep them."""
