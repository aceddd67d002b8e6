export const sessionDays = 30
