"""Made-up records and field work for the demo and for tests of size."""
