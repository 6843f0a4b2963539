"""A comparison on paper: comparison.json and a workbook for a management-of-change form."""
