"""Tables on the terminal, tidy at 80 and at 160 columns, on a light or a dark ground."""
