"""RANS closures and the job of setting up a run: coefficients, states, inlets, sheets."""
