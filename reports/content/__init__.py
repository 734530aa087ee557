"""From the network's answers to the content of a yearbook, where every number is final."""
