"""A collected sample: the mass that counts, the volume it came from, and what two trains say of one another."""
from __future__ import annotations


def volume_between(V_end, V_start):
    """What passed the meter between two readings. [m3]"""
    return V_end - V_start


def mass_of_sections(m_front, m_back):
    """Both sections of a trap together. [kg]"""
    return m_front + m_back


def mass_less_blank(m, m_blank):
    """The mass found less that of the field blank; it may be negative. [kg]"""
    return m - m_blank


def mass_for_recovery(m, r):
    """The mass that was there, from the mass found and the share that is recovered. [kg]"""
    return m / r


def mass_concentration_of_sample(m, V):
    """Mass per volume metered, at the meter's temperature and pressure. [kg/m3]"""
    return m / V


def mean_of_two_trains(gamma_a, gamma_b):
    """Their mean. [kg/m3]"""
    return (gamma_a + gamma_b) / 2


def relative_difference_of_trains(gamma_a, gamma_b):
    """The half difference over the mean, with the sign of a less b. [1]"""
    return (gamma_a - gamma_b) / (gamma_a + gamma_b)


def breakthrough(m_back, m_front):
    """What the second section caught over what the first did. [1]"""
    return m_back / m_front


def mean_rate(V, t):
    """Volume per time. [m3/s]"""
    return V / t
