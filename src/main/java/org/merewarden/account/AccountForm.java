package org.merewarden.account;

import jakarta.validation.constraints.NotBlank;
import jakarta.validation.constraints.NotNull;
import jakarta.validation.constraints.Size;
import java.util.Arrays;
import java.util.Set;
import java.util.TreeSet;
import java.util.regex.Pattern;
import org.jspecify.annotations.Nullable;
import org.springframework.validation.Errors;

/** What is typed about an account; user name and password only when it is made. */
class AccountForm {
    static final Pattern USERNAME = Pattern.compile("[a-z0-9][a-z0-9._-]{1,58}[a-z0-9]");
    private static final int LONGEST_CODE = 60;

    private int version;
    private String username = "";

    @NotBlank(message = "{account.name.missing}")
    @Size(max = 120, message = "{account.name.long}")
    private String displayName = "";

    @NotNull(message = "{account.role.missing}")
    private @Nullable Role role;

    private String waters = "";
    private String password = "";

    static AccountForm of(Account account) {
        AccountForm form = new AccountForm();
        form.version = account.version();
        form.username = account.username();
        form.displayName = account.displayName();
        form.role = account.role();
        form.waters = String.join(", ", account.asPerson().waters());
        return form;
    }

    static void checkUsername(String username, Errors errors) {
        if (!USERNAME.matcher(SignInGuard.name(username)).matches()) {
            errors.rejectValue("username", "account.username.form", new Object[] {username}, "not a user name");
        }
    }

    void checkWaters(Errors errors) {
        waterCodes().stream()
                .filter(code -> code.length() > LONGEST_CODE)
                .findFirst()
                .ifPresent(code -> errors.rejectValue(
                        "waters", "account.waters.long", new Object[] {code, LONGEST_CODE}, "too long"));
    }

    /** Codes parted by commas or spaces; none for roles that are not bound to waters. */
    Set<String> waterCodes() {
        Set<String> codes = new TreeSet<>();
        if (role == Role.CLERK) {
            Arrays.stream(waters.split("[,;\\s]+"))
                    .filter(code -> !code.isEmpty())
                    .forEach(codes::add);
        }
        return codes;
    }

    public int getVersion() {
        return version;
    }

    public void setVersion(int version) {
        this.version = version;
    }

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

    public @Nullable Role getRole() {
        return role;
    }

    public void setRole(@Nullable Role role) {
        this.role = role;
    }

    public String getWaters() {
        return waters;
    }

    public void setWaters(String waters) {
        this.waters = waters;
    }

    public String getPassword() {
        return password;
    }

    public void setPassword(String password) {
        this.password = password;
    }
}
