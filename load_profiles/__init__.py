"""Raw meter, bill and weather files in, one clean year out (`SiteYear`)."""

from load_profiles.faults import Fault, ProfileError
from load_profiles.findings import Finding
from load_profiles.site_year import CARRIERS, SiteYear

__all__ = ["CARRIERS", "Fault", "Finding", "ProfileError", "SiteYear"]
