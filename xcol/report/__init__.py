"""Records of numbers as text, JSON, CSV and Markdown."""
