"""`python -m scatterbay`."""

from scatterbay.cli.main import run

run()
