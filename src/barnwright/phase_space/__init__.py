"""Phase space: densities and the shape of peaks on its axes; today two bodies."""

from barnwright.phase_space.two_body import peak_scale, two_body_density

__all__ = ["peak_scale", "two_body_density"]
