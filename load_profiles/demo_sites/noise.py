"""Random numbers that are the same on every machine and in every NumPy version."""

import numpy as np
from scipy.signal import lfilter

from load_profiles.arrays import FloatArray


class NoiseStream:
    """A seeded stream of uniform, normal and persistent noise.

    Parameters
    ----------
    seed : int
        The same seed gives the same noise for ever.

    Notes
    -----
    Only raw 64-bit words are taken from NumPy. Their sequence is promised to stay, while that of
    `Generator.normal` may change between versions, and the committed files must not.
    """

    def __init__(self, seed: int) -> None:
        self._bits = np.random.PCG64(seed)

    def uniform(self, count: int) -> FloatArray:
        """Uniform numbers.

        Parameters
        ----------
        count : int
            How many.

        Returns
        -------
        array, shape (count,) [-]
            In [0, 1), with the 53 bits that a float can hold.
        """
        return (self._bits.random_raw(count) >> np.uint64(11)).astype(np.float64) * 2.0**-53

    def normal(self, count: int) -> FloatArray:
        """Nearly normal numbers, mean 0 and standard deviation 1.

        Parameters
        ----------
        count : int
            How many.

        Returns
        -------
        array, shape (count,) [-]
            Sums of twelve uniform numbers less six: bounded by six, which suits a meter.
        """
        return self.uniform(12 * count).reshape(count, 12).sum(axis=1) - 6.0

    def persistent(self, count: int, *, memory_steps: float) -> FloatArray:
        """First-order autoregressive noise, mean 0 and standard deviation 1.

        Parameters
        ----------
        count : int
            How many steps.
        memory_steps : float
            Steps after which the correlation has fallen to 1/e.

        Returns
        -------
        array, shape (count,) [-]
            Stationary from its first step.
        """
        kept = float(np.exp(-1.0 / memory_steps))
        shocks = self.normal(count) * np.sqrt(1.0 - kept * kept)
        shocks[0] /= np.sqrt(1.0 - kept * kept)
        return np.asarray(lfilter([1.0], [1.0, -kept], shocks), dtype=np.float64)
