package org.merewarden.account;

import jakarta.validation.constraints.NotBlank;
import jakarta.validation.constraints.Size;

/** What the first administrator types. */
class SetupForm {
    private String username = "";

    @NotBlank(message = "{account.name.missing}")
    @Size(max = 120, message = "{account.name.long}")
    private String displayName = "";

    private String password = "";

    public String getUsername() {
        return username;
    }

    public void setUsername(String username) {
        this.username = username;
    }

    public String getDisplayName() {
        return displayName;
    }

    public void setDisplayName(String displayName) {
        this.displayName = displayName.strip();
    }

    public String getPassword() {
        return password;
    }

    public void setPassword(String password) {
        this.password = password;
    }
}
