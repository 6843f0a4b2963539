"""Our sheets of the annotated workbook, one a file, built with openpyxl."""
