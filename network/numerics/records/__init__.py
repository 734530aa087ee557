"""The stage record: readings, their packed months, corrections, screening."""
