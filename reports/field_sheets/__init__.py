"""Field sheets: one page a stop, for the clipboard; what was there last and boxes to write in."""
