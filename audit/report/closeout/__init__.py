"""What the close-out hands over: tables on the terminal, closeout.json, and a workbook to sign."""
