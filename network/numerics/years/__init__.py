"""Days and years: daily means, infills, the figures of a water year."""
