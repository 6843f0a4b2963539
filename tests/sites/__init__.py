"""Invented sites, made from physics: plants, their protection settings and the workbooks that hold them."""
