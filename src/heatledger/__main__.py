"""``python -m heatledger``."""

from heatledger.cli import main

main(prog_name="heatledger")
