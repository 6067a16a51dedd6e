package org.merewarden.account;

import static org.springframework.http.HttpMethod.GET;
import static org.springframework.http.HttpMethod.HEAD;
import static org.springframework.http.HttpMethod.POST;

import java.util.Map;
import org.merewarden.web.SecurityHeaders;
import org.springframework.beans.factory.annotation.Value;
import org.springframework.boot.web.servlet.FilterRegistrationBean;
import org.springframework.context.annotation.Bean;
import org.springframework.context.annotation.Configuration;
import org.springframework.http.HttpMethod;
import org.springframework.security.config.annotation.web.builders.HttpSecurity;
import org.springframework.security.config.annotation.web.configurers.AuthorizeHttpRequestsConfigurer;
import org.springframework.security.core.userdetails.User;
import org.springframework.security.core.userdetails.UserDetailsService;
import org.springframework.security.core.userdetails.UsernameNotFoundException;
import org.springframework.security.crypto.bcrypt.BCryptPasswordEncoder;
import org.springframework.security.crypto.password.DelegatingPasswordEncoder;
import org.springframework.security.crypto.password.PasswordEncoder;
import org.springframework.security.web.SecurityFilterChain;
import org.springframework.security.web.authentication.UsernamePasswordAuthenticationFilter;

/** Who may open what: every address and method is named here; what is not is refused. */
@Configuration
class SecurityConfiguration {
    private static final String CLERK = Role.CLERK.name();
    private static final String BIOLOGIST = Role.BIOLOGIST.name();
    private static final String APPROVER = Role.APPROVER.name();
    private static final String ADMINISTRATOR = Role.ADMINISTRATOR.name();

    @Bean
    SecurityFilterChain doors(HttpSecurity http, SignInGuard guard) throws Exception {
        return http.authorizeHttpRequests(SecurityConfiguration::rules)
                .formLogin(form -> form.loginPage("/sign-in")
                        .failureUrl("/sign-in?wrong")
                        .defaultSuccessUrl("/portfolio")
                        .permitAll())
                .logout(logout -> logout.logoutUrl("/sign-out").logoutSuccessUrl("/sign-in?out"))
                .headers(SecurityHeaders.all())
                .addFilterBefore(guard, UsernamePasswordAuthenticationFilter.class)
                .build();
    }

    private static void rules(
            AuthorizeHttpRequestsConfigurer<HttpSecurity>.AuthorizationManagerRequestMatcherRegistry rule) {
        rule.requestMatchers("/sign-in/**", "/setup/**", "/view/**", "/actuator/health/**", "/error")
                .permitAll();
        rule.requestMatchers(GET, "/css/**", "/js/**", "/marks/**", "/webjars/**")
                .permitAll();
        pages(rule, GET);
        pages(rule, HEAD);
        acts(rule);
        rule.anyRequest().denyAll();
    }

    private static void pages(
            AuthorizeHttpRequestsConfigurer<HttpSecurity>.AuthorizationManagerRequestMatcherRegistry rule,
            HttpMethod method) {
        rule.requestMatchers(method, "/accounts/**", "/settings/**").hasRole(ADMINISTRATOR);
        rule.requestMatchers(method, "/activity/**", "/shares/**").hasAnyRole(BIOLOGIST, APPROVER, ADMINISTRATOR);
        rule.requestMatchers(method, "/imports/**", "/policy/new").hasAnyRole(BIOLOGIST, APPROVER);
        rule.requestMatchers(method, "/**").authenticated();
    }

    private static void acts(
            AuthorizeHttpRequestsConfigurer<HttpSecurity>.AuthorizationManagerRequestMatcherRegistry rule) {
        rule.requestMatchers(POST, "/limits/*/issue", "/limits/*/refuse", "/limits/*/withdraw")
                .hasRole(APPROVER);
        rule.requestMatchers(POST, "/policy/*/adopt", "/policy/*/refuse").hasRole(APPROVER);
        rule.requestMatchers(POST, "/limits/*/discard", "/limits/*/objections", "/limits/*/signed-pages")
                .hasAnyRole(BIOLOGIST, APPROVER);
        rule.requestMatchers(POST, "/landings/**", "/season/*/complete").hasAnyRole(CLERK, BIOLOGIST, APPROVER);
        rule.requestMatchers(
                        POST,
                        "/imports/**",
                        "/water-bodies/**",
                        "/cooperatives/**",
                        "/species-weights",
                        "/stocks/**",
                        "/assessments/**",
                        "/policy",
                        "/policy/*/trial",
                        "/shares")
                .hasAnyRole(BIOLOGIST, APPROVER);
        rule.requestMatchers(POST, "/shares/*/revoke").hasAnyRole(BIOLOGIST, APPROVER, ADMINISTRATOR);
        rule.requestMatchers(POST, "/accounts/**", "/settings").hasRole(ADMINISTRATOR);
        rule.requestMatchers(POST, "/sign-out").authenticated();
    }

    /** The guard stands inside the security chain; the container must not add it once more. */
    @Bean
    FilterRegistrationBean<SignInGuard> guardStandsInside(SignInGuard guard) {
        FilterRegistrationBean<SignInGuard> registration = new FilterRegistrationBean<>(guard);
        registration.setEnabled(false);
        return registration;
    }

    /** BCrypt, about a third of a second a try; the name of the hash stands before it, so that it can be changed. */
    @Bean
    PasswordEncoder passwordEncoder(@Value("${merewarden.password-strength:12}") int strength) {
        return new DelegatingPasswordEncoder("bcrypt", Map.of("bcrypt", new BCryptPasswordEncoder(strength)));
    }

    @Bean
    UserDetailsService signInNames(AccountRepository accounts) {
        return typed -> accounts.findByUsername(SignInGuard.name(typed))
                .map(account -> User.withUsername(account.username())
                        .password(account.passwordHash())
                        .roles(account.role().name())
                        .disabled(!account.enabled())
                        .build())
                .orElseThrow(() -> new UsernameNotFoundException("no account of this name"));
    }
}
