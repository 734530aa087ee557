"""Everything that is due, rule by rule, and the one list made of it."""
