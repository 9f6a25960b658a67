"""Oblique shocks, expansions and sections in supersonic flow."""
