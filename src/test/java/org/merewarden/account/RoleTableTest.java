package org.merewarden.account;

import static org.assertj.core.api.Assertions.assertThat;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.csrf;
import static org.springframework.security.test.web.servlet.request.SecurityMockMvcRequestPostProcessors.user;
import static org.springframework.test.web.servlet.request.MockMvcRequestBuilders.request;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.redirectedUrlPattern;
import static org.springframework.test.web.servlet.result.MockMvcResultMatchers.status;

import java.util.List;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvFileSource;
import org.merewarden.WholeApplication;
import org.springframework.beans.factory.annotation.Autowired;
import org.springframework.http.HttpMethod;
import org.springframework.security.authentication.TestingAuthenticationToken;
import org.springframework.security.core.Authentication;
import org.springframework.security.web.access.WebInvocationPrivilegeEvaluator;
import org.springframework.test.web.servlet.MockMvc;

/**
 * Role × address × method. Every cell is put to the rules themselves, so that nothing is done by asking; every refusal
 * also goes through the doors as a request.
 */
@WholeApplication
class RoleTableTest {
    @Autowired
    private WebInvocationPrivilegeEvaluator rules;

    @Autowired
    private MockMvc mvc;

    @ParameterizedTest(name = "{0} {1}")
    @CsvFileSource(resources = "/doors/roles.csv", numLinesToSkip = 3, ignoreLeadingAndTrailingWhitespace = true)
    void eachRoleEntersWhereItMay(
            String method, String address, String clerk, String biologist, String approver, String administrator)
            throws Exception {
        List<String> expected = List.of(clerk, biologist, approver, administrator);
        for (Role role : Role.values()) {
            boolean in = expected.get(role.ordinal()).equals("in");
            Authentication person = new TestingAuthenticationToken("somebody", "", "ROLE_" + role);
            assertThat(rules.isAllowed("", address, method, person))
                    .as("%s %s as %s", method, address, role)
                    .isEqualTo(in);
            if (!in) {
                mvc.perform(request(HttpMethod.valueOf(method), address)
                                .with(user("somebody").roles(role.name()))
                                .with(csrf()))
                        .andExpect(status().isForbidden());
            }
        }
        mvc.perform(request(HttpMethod.valueOf(method), address).with(csrf()))
                .andExpect(status().isFound())
                .andExpect(redirectedUrlPattern("/sign-in*"));
    }
}
