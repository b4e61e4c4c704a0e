"""Extra-column band broadening of a liquid chromatograph, part by part."""

__version__ = "0.1.0"
