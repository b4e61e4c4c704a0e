"""Viscosity, density and diffusion of what flows (to come: until then they stand in the file)."""
