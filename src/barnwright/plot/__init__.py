"""Pictures of predictions and scans; matplotlib is imported when the first one is drawn.

figure = prediction.plot()                # or barnwright.plot.draw(prediction)
prediction.plot("angle.pdf")
"""

from __future__ import annotations

from barnwright.plot.backend import check_picture, encode
from barnwright.plot.picture import picture
from barnwright.plot.prediction import check_drawable, draw
from barnwright.plot.scan import check_axes, draw_scan

__all__ = ["check_axes", "check_drawable", "check_picture", "draw", "draw_scan", "encode", "picture"]
