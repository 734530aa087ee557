"""System checks of a deployment: clock, database, data folder, secret key."""
