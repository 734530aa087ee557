"""The staff site: forms and lists over the books."""
