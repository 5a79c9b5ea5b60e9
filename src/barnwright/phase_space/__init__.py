"""Phase space: maps from the unit cube to momenta with exact densities, and the channels of a reaction.

`channel` tells the conventions, `maps` the changes of variable, `channels` chooses. Two bodies in closed form and by
quadrature have their density and their peaks in `two_body`.
"""

from barnwright.phase_space.channel import Channel, densities
from barnwright.phase_space.channels import channels_of
from barnwright.phase_space.flat import flat_channel
from barnwright.phase_space.limits import Limits
from barnwright.phase_space.two_body import peak_scale, two_body_density

__all__ = ["Channel", "Limits", "channels_of", "densities", "flat_channel", "peak_scale", "two_body_density"]
