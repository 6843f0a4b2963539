"""Reports: terminal tables, the record, and the annotated workbook."""
