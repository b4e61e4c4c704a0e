"""One module a question: in goes an instrument, out comes a record of numbers."""
