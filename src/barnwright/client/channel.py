"""How the client talks: options of the channel, retries, and what it tells the server about itself."""

from __future__ import annotations

import json

from barnwright.errors import RequestError, Violation, show

SERVICE = "barnwright.wire.v1.CrossSectionService"
DETAILS_BYTES = 1 << 20
METADATA = (("barnwright-details-bytes", str(DETAILS_BYTES)),)

_CONFIG = {
    "methodConfig": [
        {
            "name": [{"service": SERVICE}],
            "retryPolicy": {
                "maxAttempts": 5,
                "initialBackoff": "0.1s",
                "maxBackoff": "2s",
                "backoffMultiplier": 2.5,
                "retryableStatusCodes": ["UNAVAILABLE", "RESOURCE_EXHAUSTED"],
            },
        }
    ]
}

OPTIONS: tuple[tuple[str, str | int], ...] = (
    ("grpc.service_config", json.dumps(_CONFIG)),
    ("grpc.enable_retries", 1),
    ("grpc.max_receive_message_length", 1 << 30),
    ("grpc.max_send_message_length", 1 << 26),
    ("grpc.max_metadata_size", 2 * DETAILS_BYTES),
    ("grpc.absolute_max_metadata_size", 4 * DETAILS_BYTES),
    ("grpc.initial_reconnect_backoff_ms", 100),
    ("grpc.min_reconnect_backoff_ms", 100),
    ("grpc.max_reconnect_backoff_ms", 1000),
    ("grpc.use_local_subchannel_pool", 1),
)


def checked_address(address: str) -> str:
    """The address. Raises ``RequestError`` when it is not of the form host:port."""
    host, colon, port = address.rpartition(":")
    if not (host and colon and port.isascii() and port.isdigit() and 0 < int(port[:6]) < 65536):
        expected = "host:port with a port from 1 to 65535, such as 127.0.0.1:50551"
        raise RequestError([Violation("address", show(address), expected)])
    return address


def absent(address: str, seconds: float) -> str:
    """What to say when nobody answers."""
    return (
        f"no server answered at {address} within {seconds:g} s; is it running, and is the address right? "
        f"It is started by: barnwright serve --address {address}"
    )
