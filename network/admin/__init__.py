"""The staff site: forms and lists over the books, one module for each noun."""
