"""A receiver on this machine that does what it is told: takes, refuses, stalls, drips, redirects, is gone."""

import ipaddress
import ssl
import threading
import time
from collections.abc import Iterator
from contextlib import contextmanager
from dataclasses import dataclass, field
from datetime import UTC, datetime, timedelta
from http.server import BaseHTTPRequestHandler, ThreadingHTTPServer
from pathlib import Path
from typing import Any

from cryptography import x509
from cryptography.hazmat.primitives import hashes, serialization
from cryptography.hazmat.primitives.asymmetric import ec
from cryptography.x509.oid import NameOID


@dataclass
class Received:
    """One request as it came."""

    path: str
    headers: dict[str, str]
    body: bytes


@dataclass
class ToldReceiver:
    """What the receiver does, and what it was sent. `connections` counts every connection made to it."""

    port: int = 0
    status: int = 200
    headers: dict[str, str] = field(default_factory=dict)
    stall_seconds: float = 0
    drip: bool = False
    received: list[Received] = field(default_factory=list)
    connections: int = 0
    names_asked_for: list[str | None] = field(default_factory=list)

    @property
    def place(self) -> str:
        return f"127.0.0.1:{self.port}"

    @property
    def address(self) -> str:
        return f"http://{self.place}/events"


def _handler(told: ToldReceiver) -> type[BaseHTTPRequestHandler]:
    class Handler(BaseHTTPRequestHandler):
        def do_POST(self) -> None:
            body = self.rfile.read(int(self.headers["Content-Length"]))
            told.received.append(Received(self.path, dict(self.headers.items()), body))
            time.sleep(told.stall_seconds)
            try:
                if told.drip:
                    self._drip()
                else:
                    self.send_response(told.status)
                    for name, value in told.headers.items():
                        self.send_header(name, value)
                    self.end_headers()
            except OSError:
                pass  # the sender had enough

        def _drip(self) -> None:
            self.wfile.write(b"HTTP/1.1 200 OK\r\n")
            for number in range(400):
                self.wfile.write(b"X-%d: y\r\n" % number)
                self.wfile.flush()
                time.sleep(0.05)

        def log_message(self, *_: Any) -> None:
            pass

    return Handler


@contextmanager
def running(tls: ssl.SSLContext | None = None) -> Iterator[ToldReceiver]:
    """This function will run a receiver on a free port of 127.0.0.1 until the block ends."""
    told = ToldReceiver()

    class Server(ThreadingHTTPServer):
        daemon_threads = True
        block_on_close = False

        def get_request(self) -> Any:
            told.connections += 1
            return super().get_request()

        def handle_error(self, *_: Any) -> None:
            pass  # a sender that hangs up is what some tests are about

    server = Server(("127.0.0.1", 0), _handler(told))
    if tls is not None:
        tls.sni_callback = lambda _socket, name, _context: told.names_asked_for.append(name)
        server.socket = tls.wrap_socket(server.socket, server_side=True)
    told.port = server.server_port
    thread = threading.Thread(target=server.serve_forever, kwargs={"poll_interval": 0.02}, daemon=True)
    thread.start()
    try:
        yield told
    finally:
        server.shutdown()
        server.server_close()
        thread.join()


def certificate(folder: Path, name: str) -> tuple[ssl.SSLContext, ssl.SSLContext]:
    """This function will make a certificate for a name, and return the server's context and a client's that
    trusts it.
    """
    key = ec.generate_private_key(ec.SECP256R1())
    subject = x509.Name([x509.NameAttribute(NameOID.COMMON_NAME, name)])
    alternative: x509.GeneralName
    try:
        alternative = x509.IPAddress(ipaddress.ip_address(name))
    except ValueError:
        alternative = x509.DNSName(name)
    now = datetime.now(tz=UTC)
    made = (
        x509.CertificateBuilder()
        .subject_name(subject)
        .issuer_name(subject)
        .public_key(key.public_key())
        .serial_number(x509.random_serial_number())
        .not_valid_before(now - timedelta(hours=1))
        .not_valid_after(now + timedelta(hours=1))
        .add_extension(x509.SubjectAlternativeName([alternative]), critical=False)
        .sign(key, hashes.SHA256())
    )
    paper, secret = folder / "certificate.pem", folder / "key.pem"
    paper.write_bytes(made.public_bytes(serialization.Encoding.PEM))
    secret.write_bytes(
        key.private_bytes(
            serialization.Encoding.PEM, serialization.PrivateFormat.PKCS8, serialization.NoEncryption()
        )
    )
    server = ssl.SSLContext(ssl.PROTOCOL_TLS_SERVER)
    server.load_cert_chain(paper, secret)
    return server, ssl.create_default_context(cafile=str(paper))
