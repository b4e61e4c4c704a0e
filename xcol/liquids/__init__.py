"""Viscosity, density and diffusion of what flows: SI floats or NumPy arrays in and out."""
