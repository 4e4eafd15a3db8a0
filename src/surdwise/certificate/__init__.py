"""Certificates: what a second arithmetic is given to recheck a sheet's verdicts."""

from .write import CertificateFile, write_certificate

__all__ = ["CertificateFile", "write_certificate"]
