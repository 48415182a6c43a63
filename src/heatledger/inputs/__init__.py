"""What the user may type: one row model per sheet, each column declared once."""
