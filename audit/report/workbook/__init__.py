"""The annotated workbook."""
