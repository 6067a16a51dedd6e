package org.merewarden.account;

import jakarta.validation.constraints.NotBlank;
import jakarta.validation.constraints.Pattern;
import jakarta.validation.constraints.Size;
import java.time.ZoneId;
import java.util.LinkedHashMap;
import java.util.Map;
import org.merewarden.web.OfficeSettings;
import org.springframework.validation.Errors;

/** The office's settings as typed. */
class SettingsForm {
    @NotBlank(message = "{settings.office.missing}")
    @Size(max = 120, message = "{settings.office.long}")
    private String officeName = "";

    private String timeZone = "";

    @Pattern(regexp = "[1-9]|1[0-2]", message = "{settings.month.wrong}")
    private String firstMonth = "";

    @Pattern(regexp = "yes|no", message = "{settings.own.wrong}")
    private String ownProposals = "";

    @Size(max = 1000, message = "{settings.notice.long}")
    private String legalBasis = "";

    @Size(max = 1000, message = "{settings.notice.long}")
    private String objection = "";

    static SettingsForm of(Map<String, String> settings) {
        SettingsForm form = new SettingsForm();
        form.officeName = settings.getOrDefault(OfficeSettings.OFFICE_NAME, "");
        form.timeZone = settings.getOrDefault(OfficeSettings.TIME_ZONE, "");
        form.firstMonth = settings.getOrDefault(OfficeSettings.FIRST_MONTH, "");
        form.ownProposals = settings.getOrDefault(OfficeSettings.OWN_PROPOSALS, "");
        form.legalBasis = settings.getOrDefault(OfficeSettings.LEGAL_BASIS, "");
        form.objection = settings.getOrDefault(OfficeSettings.OBJECTION, "");
        return form;
    }

    Map<String, String> settings() {
        Map<String, String> settings = new LinkedHashMap<>();
        settings.put(OfficeSettings.OFFICE_NAME, officeName);
        settings.put(OfficeSettings.TIME_ZONE, timeZone);
        settings.put(OfficeSettings.FIRST_MONTH, firstMonth);
        settings.put(OfficeSettings.OWN_PROPOSALS, ownProposals);
        settings.put(OfficeSettings.LEGAL_BASIS, legalBasis);
        settings.put(OfficeSettings.OBJECTION, objection);
        return settings;
    }

    /** Names of the zone database only: an offset knows no summer time. */
    void checkZone(Errors errors) {
        if (!ZoneId.getAvailableZoneIds().contains(timeZone)) {
            errors.rejectValue("timeZone", "settings.zone.wrong", new Object[] {timeZone}, "no such zone");
        }
    }

    public String getOfficeName() {
        return officeName;
    }

    public void setOfficeName(String officeName) {
        this.officeName = officeName.strip();
    }

    public String getTimeZone() {
        return timeZone;
    }

    public void setTimeZone(String timeZone) {
        this.timeZone = timeZone.strip();
    }

    public String getFirstMonth() {
        return firstMonth;
    }

    public void setFirstMonth(String firstMonth) {
        this.firstMonth = firstMonth;
    }

    public String getOwnProposals() {
        return ownProposals;
    }

    public void setOwnProposals(String ownProposals) {
        this.ownProposals = ownProposals;
    }

    public String getLegalBasis() {
        return legalBasis;
    }

    public void setLegalBasis(String legalBasis) {
        this.legalBasis = legalBasis.strip();
    }

    public String getObjection() {
        return objection;
    }

    public void setObjection(String objection) {
        this.objection = objection.strip();
    }
}
