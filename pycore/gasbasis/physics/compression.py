"""Compression factor near ambient pressure, ISO 6976."""
from __future__ import annotations


def compression_factor(p, p_0, s):
    """Z = 1 - (p/p0) s2, s the sum of the components' summation factors. [1]"""
    return 1 - p / p_0 * s ** 2


def density(p, M_gas, Z, R, T):
    """Density of a gas. [kg/m3]"""
    return p * M_gas / (Z * R * T)
