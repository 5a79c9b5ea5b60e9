"""Addresses to listen at."""

from __future__ import annotations

import ipaddress
from dataclasses import dataclass

from barnwright.errors import RequestError, Violation, show

_FORM = "host:port with a port from 0 to 65535, such as 127.0.0.1:50551 or [::1]:50551"
_OPEN = (
    "an address that only this machine can reach, such as 127.0.0.1:50551: there is no encryption yet, so that anybody "
    "on the way could read and change requests; --insecure listens there all the same"
)


@dataclass(frozen=True, slots=True)
class Address:
    """A host, as name or number without brackets, and a port."""

    host: str
    port: int

    @property
    def is_loopback(self) -> bool:
        """Whether only this machine can reach it."""
        if self.host == "localhost":
            return True
        try:
            return ipaddress.ip_address(self.host).is_loopback
        except ValueError:
            return False

    def __str__(self) -> str:
        return f"[{self.host}]:{self.port}" if ":" in self.host else f"{self.host}:{self.port}"


def read_address(text: str, *, insecure: bool) -> Address:
    """The address of a text "host:port".

    Raises:
        RequestError: when it is none, or when others can reach it and ``insecure`` is not set.
    """
    host, colon, port = text.rpartition(":")
    bracketed = host.startswith("[") and host.endswith("]")
    bare = host[1:-1] if bracketed else host
    is_port = port.isascii() and port.isdigit() and len(port) <= 5 and int(port) < 65536
    if not (colon and bare and is_port) or (":" in bare) != bracketed:
        raise RequestError([Violation("address", show(text), _FORM)])
    address = Address(bare, int(port))
    if not (insecure or address.is_loopback):
        raise RequestError([Violation("address", show(text), _OPEN)])
    return address
