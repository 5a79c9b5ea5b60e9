"""Blocks, tallies and the ledger; roots, panels and quadrature. Knows no physics: axes to components."""
