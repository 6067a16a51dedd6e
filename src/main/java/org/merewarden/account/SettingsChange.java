package org.merewarden.account;

import java.util.Map;
import org.merewarden.activity.ActivityLog;
import org.merewarden.web.OfficeSettings;
import org.springframework.stereotype.Service;
import org.springframework.transaction.annotation.Transactional;

/** Stores the settings that differ and puts each change on record. */
@Service
class SettingsChange {
    private final OfficeSettings settings;
    private final ActivityLog activity;

    SettingsChange(OfficeSettings settings, ActivityLog activity) {
        this.settings = settings;
        this.activity = activity;
    }

    /** @return how many settings changed */
    @Transactional
    public int to(Map<String, String> wanted) {
        Map<String, String> before = settings.all();
        int changed = 0;
        for (Map.Entry<String, String> setting : wanted.entrySet()) {
            String old = before.get(setting.getKey());
            if (!setting.getValue().equals(old)) {
                settings.set(setting.getKey(), setting.getValue());
                activity.record("changed setting", setting.getKey().replace('_', ' '), old, setting.getValue());
                changed++;
            }
        }
        return changed;
    }
}
