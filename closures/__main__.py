"""``python -m closures``: the same command."""

from closures.command import main

main()
