"""The building in SI units with every name resolved."""
