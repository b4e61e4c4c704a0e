"""From a path file to the described instrument."""
