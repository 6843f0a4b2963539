"""What a run hands over: terminal, record, charts, workbook."""
