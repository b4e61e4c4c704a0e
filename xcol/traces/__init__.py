"""Recorded signals (to come)."""
