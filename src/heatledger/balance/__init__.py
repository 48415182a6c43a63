"""The order of the steps: calls the standards, holds no formula of its own."""
