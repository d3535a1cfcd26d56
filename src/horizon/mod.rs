//! What an observer sees: altitude and azimuth, rising and setting.
